package tracewright.correlators;

import java.util.Arrays;
import java.util.HashMap;
import java.util.HashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.SortedSet;
import java.util.stream.IntStream;
import tracewright.cuts.Selection;
import tracewright.readers.EnsembleSource;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;

/**
 * One row of numbers per configuration, all that later stages need of an ensemble: source-averaged two-point functions,
 * connected three-point functions, products C2(t) X(t0 + tau) and X(t0 + tau). Made by streaming; lattice units.
 */
public final class Reduction {

    private final Columns columns;
    private final double[] values;      // [configuration on disk][column]; rows of configurations that were cut stay zero
    private final int timeExtent;
    private final int sourcesUsed;

    private Reduction(Columns columns, double[] values, int timeExtent, int sourcesUsed) {
        this.columns = columns;
        this.values = values;
        this.timeExtent = timeExtent;
        this.sourcesUsed = sourcesUsed;
    }

    /**
     * Reads the planned observables of the kept configurations: first loops and densities, whose time series stay in memory,
     * then correlators, which are averaged over sources and multiplied as they arrive.
     *
     * @param sources at most this many sources per configuration, the first by source time
     */
    public static Reduction read(EnsembleSource source, Selection selection, CorrelatorPlan plan, int sources) {
        return new Reader(source, selection, plan, sources).read();
    }

    private static Columns planned(CorrelatorPlan plan, int timeExtent) {
        Columns columns = new Columns();
        plan.hadrons().forEach(h -> columns.add(Columns.twoPoint(h), timeExtent));
        plan.connected().forEach(c -> columns.add(Columns.connected(c), c.separation() + 1));
        plan.products().forEach((hadron, byOperator) -> byOperator.forEach((operator, separations) -> {
            separations.forEach(t -> columns.add(Columns.product(hadron, operator, t), t + 1));
            if (!separations.isEmpty()) {
                columns.add(Columns.slice(hadron, operator), separations.last() + 1);
            }
        }));
        return columns;
    }

    Columns columns() {
        return columns;
    }

    /** [configuration on disk][column], not copied: for this package's kernels only. */
    double[] values() {
        return values;
    }

    public int timeExtent() {
        return timeExtent;
    }

    /** Largest number of sources used on any configuration. */
    public int sourcesUsed() {
        return sourcesUsed;
    }

    /** Source-averaged two-point function of one time slice, [configuration on disk]; configurations that were cut hold zero. */
    public double[] twoPointSeries(String hadron, int t) {
        return column(columns.offset(Columns.twoPoint(hadron)) + t);
    }

    /** Average over the slices that enter products of a loop or density, [configuration on disk]. */
    public double[] sliceSeries(String hadron, Observable operator, int slices) {
        double[] sum = new double[values.length / columns.size()];
        int offset = columns.offset(Columns.slice(hadron, operator));
        for (int i = 0; i < sum.length; i++) {
            for (int tau = 0; tau < slices; tau++) {
                sum[i] += values[i * columns.size() + offset + tau] / slices;
            }
        }
        return sum;
    }

    private double[] column(int c) {
        double[] series = new double[values.length / columns.size()];
        for (int i = 0; i < series.length; i++) {
            series[i] = values[i * columns.size() + c];
        }
        return series;
    }

    /** State of one pass over the data. */
    private static final class Reader {

        private final EnsembleSource source;
        private final CorrelatorPlan plan;
        private final int maximalSources;
        private final int extent;
        private final Columns columns;
        private final Map<ConfigurationId, Integer> rows = new HashMap<>();
        private final Map<Observable, double[]> slices = new HashMap<>();   // [configuration on disk][2 T]
        private final double[] values;
        private final double[] row;
        private int sourcesUsed;

        Reader(EnsembleSource source, Selection selection, CorrelatorPlan plan, int maximalSources) {
            this.source = source;
            this.plan = plan;
            this.maximalSources = maximalSources;
            this.extent = source.timeExtent();
            this.columns = planned(plan, extent);
            List<ConfigurationId> onDisk = selection.onDisk();
            for (int i = 0; i < onDisk.size(); i++) {
                if (selection.kept(i)) {
                    rows.put(onDisk.get(i), i);
                }
            }
            this.values = new double[onDisk.size() * columns.size()];
            this.row = new double[columns.size()];
            plan.products().values().forEach(byOperator -> byOperator.keySet()
                .forEach(o -> slices.computeIfAbsent(o, x -> new double[onDisk.size() * 2 * extent])));
        }

        Reduction read() {
            Set<Observable> needed = new HashSet<>(plan.observables());
            source.read(o -> needed.contains(o) && !o.hasSources(), rows::containsKey, this::keepSlices);
            source.read(o -> needed.contains(o) && o.hasSources(), rows::containsKey, this::reduce);
            return new Reduction(columns, values, extent, sourcesUsed);
        }

        private void keepSlices(Observable observable, ConfigurationId configuration, int[] times, double[] x) {
            double[] twice = slices.get(observable);
            int at = rows.get(configuration) * 2 * extent;
            System.arraycopy(x, 0, twice, at, extent);
            System.arraycopy(x, 0, twice, at + extent, extent);
        }

        private void reduce(Observable observable, ConfigurationId configuration, int[] times, double[] x) {
            int[] order = firstSources(times);
            sourcesUsed = Math.max(sourcesUsed, order.length);
            int length = x.length / times.length;
            double[] chosen = chosen(x, order, length);
            int index = rows.get(configuration);
            int base = index * columns.size();
            if (observable instanceof Observable.TwoPoint two) {
                store(Columns.twoPoint(two.hadron()), chosen, order.length, length, base);
                products(two.hadron(), index, pick(times, order), chosen, length, base);
            } else if (observable instanceof Observable.Connected connected) {
                store(Columns.connected(connected), chosen, order.length, length, base);
            }
        }

        private void store(Columns.Entry entry, double[] x, int sources, int length, int base) {
            int offset = columns.offset(entry);
            ReductionKernels.sourceAverage(x, sources, length, row, offset);
            System.arraycopy(row, offset, values, base + offset, length);
        }

        private void products(String hadron, int index, int[] times, double[] twoPoint, int length, int base) {
            double[] weight = new double[times.length];
            double[] ones = new double[times.length];
            Arrays.fill(ones, 1);
            double[] twice = new double[2 * extent];
            plan.products().getOrDefault(hadron, Map.of()).forEach((operator, separations) -> {
                System.arraycopy(slices.get(operator), index * 2 * extent, twice, 0, 2 * extent);
                for (int t : separations) {
                    for (int s = 0; s < times.length; s++) {
                        weight[s] = twoPoint[s * length + t];
                    }
                    productInto(Columns.product(hadron, operator, t), twice, times, weight, t, base);
                }
                sliceInto(hadron, operator, separations, twice, times, ones, base);
            });
        }

        private void sliceInto(String hadron, Observable operator, SortedSet<Integer> separations, double[] twice, int[] times, double[] ones, int base) {
            if (!separations.isEmpty()) {
                productInto(Columns.slice(hadron, operator), twice, times, ones, separations.last(), base);
            }
        }

        private void productInto(Columns.Entry entry, double[] twice, int[] times, double[] weight, int last, int base) {
            int offset = columns.offset(entry);
            ReductionKernels.product(twice, times, weight, times.length, last, row, offset);
            System.arraycopy(row, offset, values, base + offset, last + 1);
        }

        /** Indices of the sources that are used, by source time. */
        private int[] firstSources(int[] times) {
            return IntStream.range(0, times.length).boxed().sorted((i, j) -> Integer.compare(times[i], times[j]))
                .limit(maximalSources).mapToInt(Integer::intValue).toArray();
        }

        private static double[] chosen(double[] x, int[] order, int length) {
            double[] y = new double[order.length * length];
            for (int s = 0; s < order.length; s++) {
                System.arraycopy(x, order[s] * length, y, s * length, length);
            }
            return y;
        }

        private static int[] pick(int[] times, int[] order) {
            return IntStream.of(order).map(i -> times[i]).toArray();
        }
    }
}
