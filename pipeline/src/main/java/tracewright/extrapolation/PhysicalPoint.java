package tracewright.extrapolation;

import java.util.ArrayList;
import java.util.List;
import tracewright.fitters.leastsquares.TermsFit;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.study.InputException;
import tracewright.study.Problem;
import tracewright.study.Study.Extrapolation.Term;

/**
 * One quantity at vanishing spacing and the physical pion mass, from a linear fit in named terms.
 *
 * @param value        O_0 in MeV
 * @param coefficients of the terms, in their order: MeV/fm^2 and MeV/GeV^2
 * @param entries      the data, with {@link Entry#shift} that brings each to the line through the physical point
 */
public record PhysicalPoint(
    SampledNumber value, List<Term> terms, List<SampledNumber> coefficients, List<Entry> entries, double chiSquared, int degreesOfFreedom, double pValue) {

    /**
     * One ensemble's number with its abscissas.
     *
     * @param spacingFm      a in fm
     * @param pionMassMev    pion mass of the ensemble in MeV
     */
    public record Entry(String ensemble, SampledNumber spacingFm, SampledNumber pionMassMev, SampledNumber value) {
    }

    /**
     * @param name            for messages
     * @param physicalPionMev physical pion mass in MeV
     * @throws InputException with cause USAGE if there are fewer ensembles than coefficients, or
     *                        if their abscissas do not determine the coefficients
     */
    public static PhysicalPoint of(String name, List<Entry> entries, List<Term> terms, SampledNumber physicalPionMev) {
        if (entries.size() < terms.size() + 1) {
            throw unusable("the fit of " + name + " has " + (terms.size() + 1) + " coefficients and only " + entries.size() + " ensembles");
        }
        List<SampledNumber> y = entries.stream().map(Entry::value).toList();
        List<List<SampledNumber>> design = new ArrayList<>();
        for (Entry e : entries) {
            List<SampledNumber> row = new ArrayList<>();
            row.add(SampledNumber.exact(1));
            terms.forEach(term -> row.add(abscissa(term, e, physicalPionMev)));
            design.add(row);
        }
        TermsFit fit = fit(name, y, design);
        return new PhysicalPoint(fit.parameters().get(0), List.copyOf(terms), fit.parameters().subList(1, fit.parameters().size()), List.copyOf(entries),
            fit.chiSquared(), fit.degreesOfFreedom(), fit.pValue());
    }

    private static TermsFit fit(String name, List<SampledNumber> y, List<List<SampledNumber>> design) {
        try {
            return TermsFit.of(name, y, design);
        } catch (IllegalArgumentException e) {
            throw unusable("no fit over the ensembles: " + e.getMessage());
        }
    }

    private static InputException unusable(String what) {
        return new InputException(InputException.Cause.USAGE, List.of(new Problem(what, "extrapolation.terms", "drop a term or add an ensemble")));
    }

    /** a^2 in fm^2, or Mpi^2 - Mpi_phys^2 in GeV^2. */
    public static SampledNumber abscissa(Term term, Entry e, SampledNumber physicalPionMev) {
        return switch (term) {
            case SPACING_SQUARED -> SampledNumber.evaluate(v -> v[0] * v[0], e.spacingFm());
            case PION_MASS_SQUARED -> SampledNumber.evaluate(v -> (v[0] * v[0] - v[1] * v[1]) * 1e-6, e.pionMassMev(), physicalPionMev);
        };
    }

    /** The entry's number moved to the physical value of every term but {@code shown}, for plots. */
    public SampledNumber alongLine(Entry e, Term shown, SampledNumber physicalPionMev) {
        SampledNumber moved = e.value();
        for (int i = 0; i < terms.size(); i++) {
            if (terms.get(i) != shown) {
                moved = moved.minus(coefficients.get(i).times(abscissa(terms.get(i), e, physicalPionMev)));
            }
        }
        return moved;
    }
}
