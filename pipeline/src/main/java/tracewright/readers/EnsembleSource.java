package tracewright.readers;

import java.util.List;
import java.util.function.Predicate;
import tracewright.study.ConfigurationId;
import tracewright.study.Observable;

/**
 * Everything measured on one ensemble, to be read in one pass or several; files on disk or numbers made in memory.
 * Values arrive record by record, so that a caller never holds more than it keeps.
 */
public interface EnsembleSource {

    /** Receives one array: all sources of one observable on one configuration, in the conventions of {@link Observable}. */
    @FunctionalInterface
    interface Sink {

        /**
         * @param sourceTimes [source]; empty for loops and densities
         * @param values      [source][t] or [time], flat; belongs to the caller, copy what is kept
         */
        void accept(Observable observable, ConfigurationId configuration, int[] sourceTimes, double[] values);
    }

    String name();

    int timeExtent();

    int spatialExtent();

    /** Observables in the order of the layout. */
    List<Observable> observables();

    /** The reading of each dataset in words, for reports: what it is, where it stands, how it is normalised. */
    List<String> inWords();

    /** Configurations on which an observable was measured, sorted, without opening its numbers. */
    List<ConfigurationId> configurations(Observable observable);

    /**
     * Hands every wanted record to the sink. Of one observable, configurations come in the order of the files.
     *
     * @param wanted which observables and which configurations; others are neither converted nor checked
     * @throws tracewright.study.InputException with every unreadable or non-finite value found (up to a limit), by file, dataset, configuration and source
     */
    void read(Predicate<Observable> wanted, Predicate<ConfigurationId> configurations, Sink sink);
}
