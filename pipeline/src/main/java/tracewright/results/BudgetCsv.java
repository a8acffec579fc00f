package tracewright.results;

import java.io.IOException;
import java.io.OutputStream;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Results.Budget;
import tracewright.results.Results.Term;

/**
 * {@code budget.csv}: one row per contribution to a hadron's mass, in the order of the results; after the terms of a budget come
 * the rows {@code total}, {@code mass} and {@code closure} (mass minus total). Values in MeV, fractions of that budget's mass,
 * {@code scale_gev} in GeV; {@code largest_cause} is the group with the largest part of the variance of the value, and
 * {@code largest_cause_share} that part between 0 and 1. Fields that do not apply are empty.
 */
public final class BudgetCsv {

    private static final List<String> HEADER = List.of("ensemble", "hadron", "decomposition", "term", "value_mev", "error_mev", "fraction",
        "fraction_error", "scheme", "scale_gev", "largest_cause", "largest_cause_share");

    private BudgetCsv() {
    }

    /** @throws IllegalArgumentException naming the term, if a number is NaN or infinite; nothing is written then */
    public static void write(Results results, OutputStream out) throws IOException {
        List<List<String>> rows = new ArrayList<>();
        for (Budget b : results.budgets()) {
            for (Term t : b.terms()) {
                rows.add(row(b, t.id(), t.value(), t.fraction()));
            }
            rows.add(row(b, "total", b.total(), b.total().dividedBy(b.mass())));
            rows.add(row(b, "mass", b.mass(), b.mass().dividedBy(b.mass())));
            rows.add(row(b, "closure", b.closure(), b.closure().dividedBy(b.mass())));
        }
        CsvOut.write(HEADER, rows, out);
    }

    private static List<String> row(Budget b, String term, SampledNumber value, SampledNumber fraction) {
        String id = b.ensemble() + "." + b.hadron() + "." + b.decomposition() + "." + term;
        Optional<Published.Cause> cause = Published.largestCause(value);
        return List.of(
            b.ensemble(), b.hadron(), b.decomposition(), term,
            Program.digits(value.central(), id + ": value"),
            Program.digits(Published.error(value), id + ": error"),
            Program.digits(fraction.central(), id + ": fraction"),
            Program.digits(Published.error(fraction), id + ": fraction error"),
            b.scheme().orElse(""),
            b.scaleGev().map(scale -> Program.digits(scale, id + ": scale")).orElse(""),
            cause.map(Published.Cause::key).orElse(""),
            cause.map(c -> Program.digits(c.share(), id + ": share")).orElse(""));
    }
}
