package tracewright.results;

import java.io.IOException;
import java.io.OutputStream;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.stream.Stream;
import tracewright.fitters.sampled.SampledNumber;
import tracewright.results.Results.Budget;
import tracewright.results.Results.EnsembleSummary;
import tracewright.results.Results.Fit;
import tracewright.results.Results.Quantity;
import tracewright.results.Results.Term;

/**
 * {@code results.json}, contract {@value #SCHEMA}: everything numeric but the samples. The JSON Schema beside this class
 * ({@value #SCHEMA_RESOURCE}) describes every member with its unit. Every member is always there; what does not apply is null.
 * Same results, same bytes.
 */
public final class ResultsJson {

    /** Name of the contract, the first member of the file. */
    public static final String SCHEMA = "tracewright-results/1";

    /** Class path resource with the JSON Schema of the file, relative to this class. */
    public static final String SCHEMA_RESOURCE = "results.schema.json";

    private ResultsJson() {
    }

    /**
     * Writes nothing at all if the results cannot be written.
     *
     * @throws IllegalArgumentException naming the id, if a number is NaN or infinite or an id occurs twice
     */
    public static void write(Results results, OutputStream out) throws IOException {
        requireDistinctIds(results.quantities());
        JsonOut json = new JsonOut();
        json.object().text("schema", SCHEMA);
        json.object("generated_by").text("program", Program.NAME).text("version", Program.version()).endObject();
        study(json, results.study());
        json.array("ensembles");
        results.ensembles().forEach(e -> ensemble(json, e));
        json.endArray().array("quantities");
        results.quantities().forEach(q -> quantity(json, q));
        json.endArray().array("budgets");
        results.budgets().forEach(b -> budget(json, b));
        json.endArray().texts("warnings", results.warnings()).endObject();
        out.write(json.finish());
    }

    private static void requireDistinctIds(List<Quantity> quantities) {
        Set<String> seen = new HashSet<>();
        for (Quantity q : quantities) {
            if (!seen.add(q.id())) {
                throw new IllegalArgumentException("two quantities have the id " + q.id() + "; an id names one number");
            }
        }
    }

    private static void study(JsonOut json, Results.StudySummary study) {
        json.object("study").text("name", study.name()).whole("seed", study.seed()).text("resampling", study.resampling());
        json.textMap("choices", study.choices()).endObject();
    }

    private static void ensemble(JsonOut json, EnsembleSummary e) {
        json.subject("ensemble " + e.name()).object().text("name", e.name());
        json.whole("time_extent", e.timeExtent()).whole("spatial_extent", e.spatialExtent());
        json.object("spacing_fm");
        valueAndError(json, e.spacingFm()).endObject();
        json.whole("configurations_on_disk", e.configurationsOnDisk()).whole("configurations", e.configurations());
        json.wholeMap("streams", e.streams()).wholeMap("cuts", e.removed());
        json.whole("sources_per_configuration", e.sourcesPerConfiguration()).whole("blocks", e.blocks());
        json.whole("block_length", e.blockLength()).text("block_reason", e.blockReason());
        json.array("autocorrelation");
        for (Results.Autocorrelation a : e.autocorrelation()) {
            json.object().text("observable", a.observable()).number("time", a.time()).number("error", a.error());
            json.text("verdict", a.verdict()).endObject();
        }
        json.endArray().texts("datasets", e.datasets()).endObject();
    }

    private static void quantity(JsonOut json, Quantity q) {
        json.subject(q.id()).object().text("id", q.id()).text("ensemble", q.ensemble()).text("hadron", q.hadron());
        json.text("quantity", q.quantity()).text("flavor", q.flavor()).number("flow_time", q.flowTime());
        valueAndError(json, q.number()).text("unit", q.unit()).text("scheme", q.scheme()).number("scale_gev", q.scaleGev());
        json.text("method", q.method()).text("route", q.route()).array("fits");
        q.fits().forEach(f -> fit(json, f));
        json.endArray().numberMap("variance_by_group", Published.varianceByShare(q.number()));
        neighbours(json, q.number()).endObject();
    }

    private static void fit(JsonOut json, Fit f) {
        json.object().text("label", f.label()).number("value", f.value()).number("error", f.error());
        json.number("chi_squared", f.chiSquared()).number("expected_chi_squared", f.expected());
        json.whole("degrees_of_freedom", f.degreesOfFreedom()).number("p_value", f.pValue());
        json.number("weight", f.weight()).number("noise_factor", f.noiseFactor()).endObject();
    }

    private static JsonOut neighbours(JsonOut json, SampledNumber number) {
        json.array("autocorrelation");
        for (Published.Neighbours n : Published.neighbours(number)) {
            json.object().text("ensemble", n.ensemble()).text("verdict", n.verdict()).number("rho1", n.rho1());
            json.number("factor", n.factor()).whole("blocks", n.blocks()).endObject();
        }
        return json.endArray();
    }

    private static void budget(JsonOut json, Budget b) {
        String id = b.ensemble() + "." + b.hadron() + "." + b.decomposition();
        json.subject(id).object().text("hadron", b.hadron()).text("ensemble", b.ensemble());
        json.text("decomposition", b.decomposition()).text("scheme", b.scheme()).number("scale_gev", b.scaleGev()).text("unit", "MeV");
        json.array("terms");
        b.terms().forEach(t -> term(json.subject(id + "." + t.id()), t));
        json.endArray().subject(id + ".total").number("total", b.total().central()).number("total_error", Published.error(b.total()));
        json.subject(id + ".mass").number("mass", b.mass().central()).number("mass_error", Published.error(b.mass()));
        closure(json.subject(id + ".closure"), b.closure());
        correlation(json.subject(id), b);
        json.endObject();
    }

    private static void term(JsonOut json, Term t) {
        json.object().text("id", t.id());
        valueAndError(json, t.value());
        json.number("fraction", t.fraction().central()).number("fraction_error", Published.error(t.fraction()));
        json.numberMap("variance_by_group", Published.varianceByShare(t.value()));
        neighbours(json, t.value()).endObject();
    }

    private static void closure(JsonOut json, SampledNumber closure) {
        json.object("closure");
        valueAndError(json, closure).number("sigma", Published.significance(closure));
        json.numberMap("variance_by_group", Published.varianceByShare(closure)).endObject();
    }

    /** Correlation of the terms and, last, the closure. */
    private static void correlation(JsonOut json, Budget b) {
        List<String> ids = Stream.concat(b.terms().stream().map(Term::id), Stream.of("closure")).toList();
        List<SampledNumber> numbers = new ArrayList<>(b.terms().stream().map(Term::value).toList());
        numbers.add(b.closure());
        int n = numbers.size();
        json.object("correlation").texts("ids", ids);
        json.matrix("matrix", PublishedCovariance.correlation(PublishedCovariance.matrix(numbers), n), n).endObject();
    }

    private static JsonOut valueAndError(JsonOut json, SampledNumber x) {
        return json.number("value", x.central()).number("error", Published.error(x));
    }
}
