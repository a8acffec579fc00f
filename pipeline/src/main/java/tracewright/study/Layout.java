package tracewright.study;

import java.util.List;
import java.util.Map;
import java.util.Optional;

/** How one group stores its files, and what each dataset means; nothing about meaning has a silent default. */
public record Layout(
    @Key("format of this file: tracewright-layout/1") String schema,
    @Key(value = "a line for people", byDefault = "\"\"") String about,
    @Key("number of time slices T") int timeExtent,
    @Key("number of sites in each spatial direction") int spatialExtent,
    @Key("families of files, by a name that datasets refer to") Map<String, Files> files,
    @Key("what is stored") List<Dataset> datasets) {

    /** A family of files of one format that share a path template. */
    @Selector("format")
    public sealed interface Files {

        /** Path template relative to the ensemble's data folder; {@code {stream}} and {@code {trajectory}} are placeholders. */
        String path();

        /** HDF5; one file for everything, or one for each configuration if the path holds {@code {trajectory}}. */
        @Case("hdf5")
        record Hdf5(
            @Key("path template; {stream} and {trajectory} are placeholders") String path,
            @Key("where the trajectory number of each configuration stands") Label trajectory,
            @Key("where the stream's name of each configuration stands") Label stream) implements Files {
        }

        /** CSV table with a header line, plain or .gz; one row per number, rows of one configuration together. */
        @Case("csv")
        record Csv(
            @Key("path of the table; .gz is decompressed while reading") String path,
            @Key("name of the column that holds each axis or label: stream, trajectory, source-time, time, ...") Map<Column, String> columns)
            implements Files {
        }
    }

    /** What a column of a CSV table holds, other than values. */
    public enum Column {
        STREAM, TRAJECTORY, SOURCE_TIME, TIME, HIT
    }

    /** Where a configuration label stands. */
    @Selector("from")
    public sealed interface Label {

        /** The same for all. */
        @Case("constant")
        record Constant(@Key("the label") String is) implements Label {
        }

        /** A placeholder of the path template. */
        @Case("path")
        record FromPath(@Key("name of the placeholder, without braces") String placeholder) implements Label {
        }

        /** A dataset with one entry per configuration. */
        @Case("dataset")
        record FromDataset(@Key("path of the dataset in the file") String dataset) implements Label {
        }
    }

    /** Axes of a stored array, slowest first. */
    public enum Axis {
        CONFIGURATION, SOURCE, HIT, TIME
    }

    /** How complex numbers are stored. */
    public enum ComplexForm {
        /** Real numbers only. */
        NONE,
        /** A compound of two members, real part first by name re/im or r/i. */
        COMPOUND,
        /** A last axis of length two, real part first. */
        TRAILING
    }

    /** Place and shape of one stored array. */
    public record Stored(
        @Key("name of the family of files") String files,
        @Key("path of the dataset inside the file (HDF5)") Optional<String> dataset,
        @Key("axes of the array, slowest first, without the complex one (HDF5)") Optional<List<Axis>> axes,
        @Key("how complex numbers are stored (HDF5)") Optional<ComplexForm> complex,
        @Key("column that holds the value, its real part if complex (CSV)") Optional<String> value,
        @Key(value = "rows to take: column and the text it must hold (CSV)", byDefault = "{}") Map<String, String> where) {
    }

    /** Where the source times of a correlator stand. */
    @Selector("from")
    public sealed interface SourceTimes {

        /** The same list for every configuration. */
        @Case("list")
        record Fixed(@Key("source times in the order of the source axis") List<Integer> times) implements SourceTimes {
        }

        /** A dataset with axes [configuration,] source. */
        @Case("dataset")
        record FromDataset(@Key("path of the dataset in the file") String dataset) implements SourceTimes {
        }

        /** The column {@code source-time} of the table. */
        @Case("column")
        record FromColumn() implements SourceTimes {
        }
    }

    /** Origin of the time axis. */
    public enum TimeOrigin {
        /** Zero of the lattice. */
        ABSOLUTE,
        /** The source's time slice. */
        SOURCE
    }

    /** Sign that a correlator gets where it wraps around the time boundary. */
    public enum Boundary {
        PERIODIC, ANTIPERIODIC
    }

    /** Whether the boundary's sign is still in the stored numbers. */
    public enum BoundarySign {
        /** Numbers beyond the boundary carry the sign; the reader removes it. */
        INCLUDED,
        /** The sign was removed by whoever wrote the file. */
        REMOVED
    }

    /** Whether a slice's number is the sum over its sites or their average. */
    public enum Volume {
        SUM, AVERAGE
    }

    /** Which flavours a light-quark number counts. */
    public enum Counts {
        @Case("one-flavor")
        ONE_FLAVOR,
        @Case("u+d")
        UP_PLUS_DOWN
    }

    /** Sign convention of a loop. */
    public enum LoopConvention {
        /** Tr D^-1. */
        @Case("trace-inverse")
        TRACE_INVERSE,
        /** The operator's own sign, -Tr D^-1. */
        @Case("operator")
        OPERATOR
    }

    /** Normalisation of a gluon density, with G = gF the field strength that links give. */
    public enum DensityConvention {
        /** E = (1/4) G^a G^a. */
        @Case("E")
        E,
        /** G^2 = 4 E. */
        @Case("G2")
        G2,
        /** t^2 E with t in units of a^2. */
        @Case("t2E")
        T2E
    }

    /** One stored quantity and its meaning. */
    @Selector("kind")
    public sealed interface Dataset {

        Stored stored();

        /** What its values are once read. */
        Observable observable();

        /** Hadron two-point function at zero momentum. */
        @Case("two-point")
        record TwoPoint(
            @Key("name of the hadron") String hadron,
            @Key("place and shape") Stored stored,
            @Key("source times") SourceTimes sources,
            @Key("origin of the time axis: absolute or source") TimeOrigin time,
            @Key("boundary condition of the correlator in time") Boundary boundary,
            @Key("whether the boundary's sign is included in the numbers") BoundarySign boundarySign) implements Dataset {
            @Override
            public Observable observable() {
                return new Observable.TwoPoint(hadron);
            }
        }

        /** Connected three-point function with a scalar quark insertion at zero momentum, summed over space. */
        @Case("connected")
        record Connected(
            @Key("name of the hadron") String hadron,
            @Key("flavour of the insertion") Flavor flavor,
            @Key("flavours counted; the light insertion must be u+d") Counts counts,
            @Key("source-sink separation") int separation,
            @Key("place and shape; the time axis holds the insertion") Stored stored,
            @Key("source times") SourceTimes sources,
            @Key("origin of the insertion's time axis: absolute (T slices) or source (separation + 1 slices)") TimeOrigin time,
            @Key("boundary condition of the correlator in time") Boundary boundary,
            @Key("whether the boundary's sign is included in the numbers") BoundarySign boundarySign) implements Dataset {
            @Override
            public Observable observable() {
                return new Observable.Connected(hadron, flavor, separation);
            }
        }

        /** Scalar quark loop per time slice. */
        @Case("loop")
        record Loop(
            @Key("flavour of the loop") Flavor flavor,
            @Key("flavours counted: one-flavor or u+d") Counts counts,
            @Key("place and shape") Stored stored,
            @Key("sign: trace-inverse (Tr D^-1) or operator (-Tr D^-1)") LoopConvention convention,
            @Key("sum or average over the spatial sites") Volume volume) implements Dataset {
            @Override
            public Observable observable() {
                return new Observable.Loop(flavor);
            }
        }

        /** Gluon action density per time slice at one gradient-flow time. */
        @Case("action-density")
        record ActionDensity(
            @Key("flow time in units of a^2") double flowTime,
            @Key("place and shape") Stored stored,
            @Key("normalisation: E, G2 or t2E") DensityConvention convention,
            @Key("sum or average over the spatial sites") Volume volume) implements Dataset {
            @Override
            public Observable observable() {
                return new Observable.ActionDensity(flowTime);
            }
        }
    }
}
