package tracewright.extraction;

import java.util.ArrayList;
import java.util.List;
import java.util.stream.IntStream;
import tracewright.correlators.Correlators;
import tracewright.fitters.leastsquares.FitModel;
import tracewright.fitters.leastsquares.FitOutcome;
import tracewright.fitters.leastsquares.SampledFit;
import tracewright.fitters.models.Exponentials;
import tracewright.fitters.models.PeriodicExponentials;
import tracewright.fitters.sampled.SampledVector;
import tracewright.study.Span;
import tracewright.study.Study;

/** Ground-state energy of a hadron from its two-point function: scan over first time slices and numbers of states. */
public final class EnergyFits {

    private EnergyFits() {
    }

    /**
     * @param extent number of time slices T
     * @return the energy in lattice units
     */
    public static Extracted of(String ensemble, String hadron, Study.Hadron settings, int extent, Correlators correlators) {
        SampledVector c2 = correlators.twoPoint(hadron);
        List<WindowAverage.Window> windows = new ArrayList<>();
        for (Study.EnergyScan scan : settings.fits()) {
            int states = scan.states();
            scan.first().stream().forEach(first -> {
                int[] times = IntStream.rangeClosed(first, settings.last()).toArray();
                FitModel model = settings.kind() == Study.Hadron.Kind.MESON
                    ? new PeriodicExponentials(times, extent, states) : new Exponentials(times, states);
                String label = states + (states == 1 ? " state, t = " : " states, t = ") + new Span(first, settings.last());
                FitOutcome outcome = SampledFit.fit(ensemble + "." + hadron + ".energy " + label, c2.select(times), model, Rules.of(settings.covariance()));
                windows.add(new WindowAverage.Window(label, List.of(outcome), "E0"));
            });
        }
        return WindowAverage.of(ensemble + "." + hadron + ".energy", windows).get(0);
    }
}
