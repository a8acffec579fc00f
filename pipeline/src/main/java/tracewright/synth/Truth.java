package tracewright.synth;

import java.nio.file.Path;
import java.util.Arrays;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.TreeMap;
import java.util.stream.Collectors;
import java.util.stream.LongStream;
import tracewright.study.Key;
import tracewright.study.Study;

/**
 * An invented theory in physical units and the ensembles on which it is "measured"; everything an analysis of the synthetic
 * data should find follows from it by plain formulas ({@link TruthBudget}).
 */
public record Truth(
    @Key("format of this file: tracewright-truth/1") String schema,
    @Key("name of the invented theory") String name,
    @Key(value = "a line for people", byDefault = "\"\"") String about,
    @Key("seed of every random draw; the same seed gives the same files") long seed,
    @Key("constants, hadrons and operators of the theory") Theory theory,
    @Key("the ensembles to generate") List<Ensemble> ensembles) {

    /** Value of {@code schema} in files of this format. */
    public static final String SCHEMA = "tracewright-truth/1";

    public Truth {
        Checks.that(SCHEMA.equals(schema), "schema is '" + schema + "'; this program reads " + SCHEMA);
        ensembles = List.copyOf(ensembles);
        Checks.that(ensembles.stream().map(Ensemble::name).distinct().count() == ensembles.size(), "two ensembles share a name");
    }

    /** The ensemble of that name. */
    public Ensemble ensemble(String wanted) {
        return ensembles.stream().filter(e -> e.name().equals(wanted)).findFirst()
            .orElseThrow(() -> new IllegalArgumentException("the truth has no ensemble '" + wanted + "'; it has "
                + ensembles.stream().map(Ensemble::name).collect(Collectors.joining(", "))));
    }

    /** The same theory measured on other ensembles. */
    public Truth withEnsembles(List<Ensemble> others) {
        return new Truth(schema, name, about, seed, theory, others);
    }

    /** The same truth with another theory. */
    public Truth withTheory(Theory other) {
        return new Truth(schema, name, about, seed, other, ensembles);
    }

    /** Constants that all hadrons share, the hadrons, and what the operators look like on the lattice. */
    public record Theory(
        @Key("number of active flavours in b0 = (11 - 2 nf/3)/(16 pi^2)") int flavors,
        @Key("mass anomalous dimension gamma_m = -d ln m / d ln mu") double gammaM,
        @Key("physical pion mass in GeV") double physicalPionGev,
        @Key("B in Mpi^2 = 2 B m_light, in GeV: fixes the bare light-quark mass of every ensemble") double condensateGev,
        @Key("strange-quark mass in GeV, the same on every ensemble") double strangeMassGev,
        @Key("relative change of the flowed density's element per unit of t/a^2") double flowSlope,
        @Key("the pion's two-point function") Pion pion,
        @Key("the baryons, by name; they are taken in alphabetical order") Map<String, Baryon> baryons,
        @Key("loops and densities on the lattice") Operators operators,
        @Key("noise of the correlators") Noise noise) {

        public Theory {
            Checks.that(flavors >= 0 && flavors <= 16, "flavors is " + flavors + "; need 0..16 for asymptotic freedom");
            baryons = Collections.unmodifiableSortedMap(new TreeMap<>(baryons));     // an order that no hash decides
            Checks.that(!baryons.containsKey(pion.name()), "the pion and a baryon are both called " + pion.name());
            Checks.positive("physical_pion_gev", physicalPionGev);
            Checks.positive("condensate_gev", condensateGev);
            LatentFields.of(operators, 1);      // refuses correlations that contradict each other
            Checks.positive("strange_mass_gev", strangeMassGev);
        }

        /** The same theory with another noise. */
        public Theory withNoise(Noise other) {
            return new Theory(flavors, gammaM, physicalPionGev, condensateGev, strangeMassGev, flowSlope, pion, baryons, operators, other);
        }

        /** The same theory with other baryons. */
        public Theory withBaryons(Map<String, Baryon> others) {
            return new Theory(flavors, gammaM, physicalPionGev, condensateGev, strangeMassGev, flowSlope, pion, others, operators, noise);
        }

        /** Leading coefficient of the beta function, b0 = (11 - 2 nf/3)/(16 pi^2), in beta(g) = -b0 g^3. */
        public double b0() {
            return (11.0 - 2.0 * flavors / 3.0) / (16.0 * Math.PI * Math.PI);
        }
    }

    /** C(t) = A [e^{-Mt} (1 + r e^{-Dt}) + (t to T - t)], M the ensemble's pion mass. */
    public record Pion(
        @Key("name of the hadron in files") String name,
        @Key("amplitude of the ground state in lattice units") double amplitude,
        @Key("first excited state") Excited excited) {

        public Pion {
            Checks.positive("amplitude of " + name, amplitude);
        }
    }

    /** First excited state of a correlator. */
    public record Excited(
        @Key("energy gap to the ground state in GeV") double gapGev,
        @Key("amplitude relative to the ground state, A1/A0") double ratio) {

        public Excited {
            Checks.positive("gap_gev", gapGev);
            Checks.that(ratio >= 0, "ratio of amplitudes is " + ratio + "; equal source and sink need 0 or more");
        }
    }

    /**
     * A baryon whose mass, sigma terms and anomaly are exactly linear in a^2 and Mpi^2. The slope of sigma_light in Mpi^2 is the
     * mass's own, so that sigma_light = m dM/dm holds at a = 0 (Feynman-Hellmann with Mpi^2 proportional to m).
     */
    public record Baryon(
        @Key("mass") Linear mass,
        @Key("lattice artefact of sigma_light in GeV per fm^2; its slope in Mpi^2 is the mass's") double sigmaLightPerFm2,
        @Key("strange sigma term") Linear sigmaStrange,
        @Key(value = "M - anomaly - sum of sigma terms, in GeV; 0 in a theory that obeys its sum rule", byDefault = "0.0") double closureDefectGev,
        @Key("share of the light scalar element that comes from connected insertions") double connectedFraction,
        @Key("amplitude of the ground state in lattice units") double amplitude,
        @Key("first excited state") Excited excited,
        @Key("excited-state elements of the connected scalar") Mixing connected,
        @Key("excited-state elements of the loops") Mixing loops,
        @Key("excited-state elements of the gluon densities") Mixing gluon) {

        public Baryon {
            Checks.positive("amplitude", amplitude);
            Checks.that(connectedFraction >= 0 && connectedFraction <= 1, "connected_fraction is " + connectedFraction + "; need 0..1");
        }
    }

    /** O(a, Mpi) = constant + per_mpi2 Mpi^2 + per_fm2 a^2. */
    public record Linear(
        @Key("value at a = 0 and Mpi = 0, in GeV") double constantGev,
        @Key("coefficient of Mpi^2 in 1/GeV") double perMpi2,
        @Key("coefficient of a^2 in GeV per fm^2") double perFm2) {

        /** Value in GeV at a spacing in fm and a pion mass in GeV. */
        public double atGev(double spacingFm, double pionGev) {
            return constantGev + perMpi2 * pionGev * pionGev + perFm2 * spacingFm * spacingFm;
        }
    }

    /** Matrix elements with the excited state, relative to the ground state's. */
    public record Mixing(
        @Key("g01/g00") double g01,
        @Key("g11/g00") double g11) {
    }

    /** Vacuum values and equal-time fluctuations of what is measured per time slice (conventions of Observable). */
    public record Operators(
        @Key("-Tr D^-1 of u + d") SliceOperator light,
        @Key("-Tr D^-1 of the strange quark") SliceOperator strange,
        @Key("action densities, one for each flow time") List<FlowedDensity> densities,
        @Key("correlation of the light and the strange loop") double lightStrange,
        @Key("correlation of the loops with the densities") double loopDensity,
        @Key("correlation of the densities at different flow times") double flowTimes) {

        public Operators {
            densities = List.copyOf(densities);
            Checks.that(!densities.isEmpty(), "no action density; give at least one flow time");
        }
    }

    /** One number per time slice. */
    public record SliceOperator(
        @Key("vacuum value per lattice site") double vacuumPerSite,
        @Key("standard deviation of a slice's sum over its sites") double fluctuation,
        @Key(value = "standard deviation of the slice's sum from stochastic estimation, all hits averaged", byDefault = "0.0") double hitNoise) {

        public SliceOperator {
            Checks.positive("fluctuation", fluctuation);
            Checks.that(hitNoise >= 0, "hit_noise is " + hitNoise + "; need 0 or more");
        }
    }

    /** a^4 E at one flow time. */
    public record FlowedDensity(
        @Key("flow time in units of a^2") double flowTime,
        @Key("vacuum value per lattice site") double vacuumPerSite,
        @Key("standard deviation of a slice's sum over its sites") double fluctuation) {

        public FlowedDensity {
            Checks.positive("flow_time", flowTime);
            Checks.positive("fluctuation", fluctuation);
        }
    }

    /** Relative noise N(t) e(t) of two-point functions and N(t) n3 e'(t, tau) of connected ones. */
    public record Noise(
        @Key("baryon: N(t) = this times exp((M - 3/2 Mpi) t)") double baryon,
        @Key("pion: N(t) = this") double pion,
        @Key("connected insertion: noise of its ratio, relative to N(t) and to the element") double connected,
        @Key("correlation of e between neighbouring times") double betweenTimes,
        @Key("correlation of e between two sources of one configuration") double betweenSources,
        @Key("correlation of e between two hadrons") double betweenHadrons) {

        public Noise {
            Checks.that(baryon >= 0 && pion >= 0 && connected >= 0, "noise below zero");
            Checks.correlation("between_times", betweenTimes);
            Checks.correlation("between_sources", betweenSources);
            Checks.correlation("between_hadrons", betweenHadrons);
        }
    }

    /** One ensemble and how it was measured. */
    public record Ensemble(
        @Key("name: lower-case letters, digits and hyphens") String name,
        @Key("layout file that says how the data are written, relative to this file") Path layout,
        @Key("width of the numbers on disk: float32 or float64") Width width,
        @Key("lattice spacing in fm") double spacingFm,
        @Key("pion mass in GeV") double pionMassGev,
        @Key("number of time slices T") int timeExtent,
        @Key("number of sites in each spatial direction") int spatialExtent,
        @Key("Markov streams") List<Stream> streams,
        @Key("integrated autocorrelation time of every latent series, in units of the distance of two configurations") double tauInt,
        @Key("source times") Sources sources,
        @Key("number of sources of the connected three-point functions, the first of the list") int connectedSources,
        @Key("source-sink separations of the connected three-point functions") List<Integer> separations) {

        public Ensemble {
            Checks.that(name.matches("[a-z][a-z0-9-]*"), "ensemble name '" + name + "'; need lower-case letters, digits and hyphens");
            Checks.positive("spacing_fm", spacingFm);
            Checks.positive("pion_mass_gev", pionMassGev);
            Checks.that(timeExtent >= 2 && spatialExtent >= 1, "lattice of " + spatialExtent + "^3 x " + timeExtent + " sites");
            Checks.that(tauInt >= 0.5, "tau_int is " + tauInt + "; need 0.5 (no autocorrelation) or more");
            streams = List.copyOf(streams);
            separations = List.copyOf(separations);
            Checks.that(streams.stream().map(Stream::name).distinct().count() == streams.size(), "two streams of " + name + " share a name");
            Checks.that(connectedSources >= 0 && connectedSources <= sources.count(), "connected_sources is " + connectedSources
                + "; there are " + sources.count() + " sources");
            long different = Arrays.stream(sources.times(0, timeExtent)).distinct().count();
            Checks.that(different == sources.count(), sources.count() + " sources with a spacing of " + sources.spacing() + " share times on "
                + timeExtent + " slices");
            for (int separation : separations) {
                Checks.that(separation >= 0 && separation < timeExtent, "separation " + separation + " outside 0.." + (timeExtent - 1));
            }
        }

        /** The same ensemble with other streams. */
        public Ensemble withStreams(List<Stream> others) {
            return new Ensemble(name, layout, width, spacingFm, pionMassGev, timeExtent, spatialExtent, others, tauInt, sources,
                connectedSources, separations);
        }

        /** The same ensemble with one stream of n configurations, one trajectory apart, called {@code a}. */
        public Ensemble withConfigurations(int n) {
            return withStreams(List.of(new Stream("a", 1, n, 1, Optional.empty())));
        }

        /** The same ensemble with other sources, all of them used for connected three-point functions too. */
        public Ensemble withSources(Sources others) {
            return new Ensemble(name, layout, width, spacingFm, pionMassGev, timeExtent, spatialExtent, streams, tauInt, others,
                others.count(), separations);
        }

        /** The same ensemble on a lattice with another time extent. */
        public Ensemble withTimeExtent(int other) {
            return new Ensemble(name, layout, width, spacingFm, pionMassGev, other, spatialExtent, streams, tauInt, sources,
                connectedSources, separations);
        }

        /** The same ensemble with another autocorrelation time. */
        public Ensemble withTauInt(double other) {
            return new Ensemble(name, layout, width, spacingFm, pionMassGev, timeExtent, spatialExtent, streams, other, sources,
                connectedSources, separations);
        }

        /** The same ensemble with other source-sink separations. */
        public Ensemble withSeparations(List<Integer> others) {
            return new Ensemble(name, layout, width, spacingFm, pionMassGev, timeExtent, spatialExtent, streams, tauInt, sources,
                connectedSources, others);
        }
    }

    /** Width of the numbers on disk. */
    public enum Width {
        FLOAT32, FLOAT64
    }

    /** Trajectories first, first + step, ..., last of one Markov stream, without those of the gap. */
    public record Stream(
        @Key("name of the stream") String name,
        @Key("first trajectory") long first,
        @Key("last trajectory") long last,
        @Key("distance of two configurations in trajectories") long step,
        @Key("trajectories never measured, written 100..400") Optional<Study.TrajectoryRange> gap) {

        public Stream {
            Checks.that(first >= 0 && step >= 1 && last >= first && (last - first) % step == 0, "stream " + name + " runs from " + first + " to "
                + last + " in steps of " + step + "; need 0 <= first <= last, a whole number of steps apart");
            Checks.that(gap.isEmpty() || first < gap.get().first() || gap.get().last() < last, "the gap of stream " + name + " leaves nothing of it");
        }

        /** Trajectories of the configurations, rising. */
        List<Long> trajectories() {
            return LongStream.iterate(first, trajectory -> trajectory <= last, trajectory -> trajectory + step)
                .filter(trajectory -> gap.isEmpty() || trajectory < gap.get().first() || gap.get().last() < trajectory).boxed().toList();
        }
    }

    /** Source s of the i-th configuration of a stream sits at (first + s spacing + i shift) mod T. */
    public record Sources(
        @Key("number of sources on each configuration") int count,
        @Key("time of the first source") int first,
        @Key("distance of two sources") int spacing,
        @Key(value = "shift of all sources from one configuration of a stream to the next", byDefault = "0") int shift) {

        public Sources {
            Checks.that(count >= 1 && first >= 0 && spacing >= 1 && shift >= 0, "sources: count " + count + ", first " + first + ", spacing " + spacing
                + ", shift " + shift + "; need count and spacing of 1 or more, first and shift of 0 or more");
        }

        /** Source times of the configuration with that position in its stream. */
        int[] times(long position, int timeExtent) {
            int[] times = new int[count];
            for (int s = 0; s < count; s++) {
                times[s] = (int) ((first + (long) s * spacing + position * shift) % timeExtent);
            }
            return times;
        }
    }
}
