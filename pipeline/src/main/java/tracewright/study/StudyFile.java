package tracewright.study;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.snakeyaml.engine.v2.nodes.MappingNode;
import org.snakeyaml.engine.v2.nodes.NodeTuple;
import org.snakeyaml.engine.v2.nodes.ScalarNode;

/** Reads a study: keys and types strictly, then what no single key can tell. */
public final class StudyFile {

    static final String SCHEMA = "tracewright-study/1";
    private static final int FEWEST_DRAWS = 50;

    private final Study study;
    private final RecordBinder binder;
    private final List<Problem> problems = new ArrayList<>();

    private StudyFile(Study study, RecordBinder binder) {
        this.study = study;
        this.binder = binder;
    }

    /** @throws InputException with cause USAGE and every problem of the file */
    public static Study read(Path file) {
        return read(file, Map.of());
    }

    /**
     * @param overrides values by dotted key that replace or add to those of the file, for instance
     *                  {@code ensembles.alder.cuts.thermalization}
     */
    public static Study read(Path file, Map<String, String> overrides) {
        MappingNode root = YamlTree.read(file);
        YamlTree.override(root, overrides);
        RecordBinder binder = new RecordBinder(file, inputs(root));
        Optional<Study> study = binder.bind(root, Study.class);
        List<Problem> problems = new ArrayList<>(binder.problems());
        study.ifPresent(s -> problems.addAll(new StudyFile(s, binder).check()));
        if (!problems.isEmpty()) {
            throw new InputException(InputException.Cause.USAGE, problems);
        }
        return study.orElseThrow();
    }

    /** Inputs by name, empty where the value cannot be read; those are complained about when the file is bound. */
    private static Map<String, Optional<UncertainValue>> inputs(MappingNode root) {
        Map<String, Optional<UncertainValue>> inputs = new LinkedHashMap<>();
        for (NodeTuple t : root.getValue()) {
            if (t.getKeyNode() instanceof ScalarNode k && k.getValue().equals("inputs") && t.getValueNode() instanceof MappingNode m) {
                for (NodeTuple entry : m.getValue()) {
                    if (entry.getKeyNode() instanceof ScalarNode name && entry.getValueNode() instanceof ScalarNode value) {
                        inputs.put(name.getValue(), readable(value.getValue()));
                    }
                }
            }
        }
        return inputs;
    }

    private static Optional<UncertainValue> readable(String text) {
        try {
            return Optional.of(Scalars.uncertain(text));
        } catch (IllegalArgumentException e) {
            return Optional.empty();
        }
    }

    private void problem(String path, String what, String remedy) {
        problems.add(new Problem(what, binder.where(path), remedy));
    }

    private List<Problem> check() {
        if (!study.schema().equals(SCHEMA)) {
            problem("schema", "this program reads " + SCHEMA + ", the file says '" + study.schema() + "'", "write schema: " + SCHEMA);
        }
        word("name", study.name());
        study.inputs().keySet().forEach(name -> word("inputs." + name, name));
        if (study.resampling() instanceof Study.Resampling.Bootstrap b && b.draws() < FEWEST_DRAWS) {
            problem("resampling.draws", b.draws() + " bootstrap draws give no useful errors", "take " + FEWEST_DRAWS + " or more, usually 500");
        }
        ensembles();
        hadrons();
        elements("connected", study.matrixElements().connected());
        elements("disconnected", study.matrixElements().disconnected());
        elements("gluon", study.matrixElements().gluon());
        renormalization();
        study.extrapolation().ifPresent(this::extrapolation);
        return problems;
    }

    private void word(String path, String name) {
        if (!name.matches("[a-z][a-z0-9-]*")) {
            problem(path, "the name '" + name + "' is not made of lower-case letters, digits and hyphens", "rename it; names become parts of ids");
        }
    }

    private void ensembles() {
        if (study.ensembles().isEmpty()) {
            problem("ensembles", "there is no ensemble", "list at least one");
        }
        Set<String> names = new HashSet<>();
        for (int i = 0; i < study.ensembles().size(); i++) {
            Study.Ensemble e = study.ensembles().get(i);
            String path = "ensembles." + e.name();
            word(path + ".name", e.name());
            if (e.name().equals("physical")) {
                problem(path + ".name", "'physical' is the reserved name of the physical point", "choose another name");
            }
            if (!names.add(e.name())) {
                problem("ensembles." + i, "two ensembles are called '" + e.name() + "'", "rename one");
            }
            if (!(e.spacingFm().value().value() > 0)) {
                problem(path + ".spacing_fm", "the lattice spacing is " + e.spacingFm().value().value() + " fm", "give a positive number");
            }
            if (!e.quarkMassLattice().containsKey(Flavor.LIGHT)) {
                problem(path + ".quark_mass_lattice", "there is no light quark mass", "add light: a m_light");
            }
            cuts(path + ".cuts", e.cuts());
        }
    }

    private void cuts(String path, Study.Cuts cuts) {
        if (cuts.stride() < 1) {
            problem(path + ".stride", "stride " + cuts.stride() + " keeps nothing", "take 1 or more");
        }
        cuts.sources().filter(n -> n < 1).ifPresent(n -> problem(path + ".sources", n + " sources per configuration leave nothing", "take 1 or more"));
        if (cuts.thermalization() < 0) {
            problem(path + ".thermalization", "trajectory numbers start at zero; thermalization is " + cuts.thermalization(), "take 0 or more");
        }
    }

    private void hadrons() {
        if (study.hadrons().values().stream().noneMatch(Study.Hadron::budget)) {
            problem("hadrons", "no hadron has a budget", "set budget: true for at least one");
        }
        study.hadrons().forEach((name, h) -> {
            word("hadrons." + name, name);
            if (h.fits().isEmpty()) {
                problem("hadrons." + name + ".fits", "no fit is configured", "write for instance [{states: 1, first: 6..9}]");
            }
            for (int i = 0; i < h.fits().size(); i++) {
                energyScan("hadrons." + name + ".fits." + i, h.fits().get(i), h.last());
            }
        });
    }

    private void energyScan(String path, Study.EnergyScan scan, int last) {
        if (scan.states() < 1 || scan.states() > 3) {
            problem(path + ".states", scan.states() + " states", "fit 1, 2 or 3");
        } else if (last - scan.first().last() < 2 * scan.states()) {
            problem(path + ".first", "time slices " + scan.first().last() + ".." + last + " are too few for " + scan.states() + " states",
                "leave more than " + 2 * scan.states() + " slices");
        }
    }

    private void elements(String key, Study.ElementFits fits) {
        String path = "matrix_elements." + key;
        boolean there = switch (fits.publish()) {
            case PLATEAU -> fits.plateau().isPresent();
            case SUMMATION -> fits.summation().isPresent();
            case TWO_STATE -> fits.twoState().isPresent();
        };
        if (!there) {
            problem(path + ".publish", "the method '" + fits.publish().word() + "' is to be published but not configured",
                "add " + fits.publish().word().replace('-', '_') + ": {...} or publish another");
        }
        fits.plateau().ifPresent(p -> scan(path + ".plateau.first", p.first(), p.separations()));
        fits.summation().ifPresent(s -> scan(path + ".summation.first", s.first(), s.separations()));
        fits.twoState().ifPresent(t -> {
            scan(path + ".two_state.first", t.first(), t.separations());
            if (t.twoPointLast() - t.twoPointFirst().last() < 4) {
                problem(path + ".two_state.two_point_last", "two-point slices " + t.twoPointFirst().last() + ".." + t.twoPointLast()
                    + " are too few for two states", "leave five or more");
            }
        });
    }

    private void scan(String path, Span first, Span separations) {
        if (first.first() < separations.first() || first.last() > separations.last()) {
            problem(path, "the scan over the smallest separation, " + first + ", leaves the separations " + separations, "stay inside them");
        }
    }

    private void renormalization() {
        Study.Renormalization r = study.renormalization();
        if (r.flavors() < 0 || r.flavors() > 6) {
            problem("renormalization.flavors", r.flavors() + " active flavours", "give 0 to 6");
        }
        for (Study.Ensemble e : study.ensembles()) {
            String path = "ensembles." + e.name() + ".quark_mass_lattice";
            if (e.quarkMassLattice().containsKey(Flavor.CHARM) && r.flavors() < 4) {
                problem(path, "a charm mass is given, but the beta function and gamma_m count " + r.flavors() + " flavours",
                    "set renormalization.flavors to 4 with gamma_m to match, or leave charm out");
            }
            if (!e.quarkMassLattice().keySet().equals(study.ensembles().get(0).quarkMassLattice().keySet())) {
                problem(path, "the flavours " + words(e) + " are not those of ensemble '" + study.ensembles().get(0).name() + "', "
                    + words(study.ensembles().get(0)), "give all ensembles the same flavours");
            }
        }
        if (!(r.scaleGev() > 0)) {
            problem("renormalization.scale_gev", "the scale is " + r.scaleGev() + " GeV", "give a positive number");
        }
    }

    private static List<String> words(Study.Ensemble e) {
        return e.quarkMassLattice().keySet().stream().map(Flavor::word).toList();
    }

    private void extrapolation(Study.Extrapolation x) {
        Study.Hadron pion = study.hadrons().get(x.pion());
        if (pion == null) {
            problem("extrapolation.pion", "there is no hadron '" + x.pion() + "'", Nearest.advice(x.pion(), study.hadrons().keySet()));
        } else if (pion.kind() != Study.Hadron.Kind.MESON) {
            problem("extrapolation.pion", "the hadron '" + x.pion() + "' is no meson", "name the pseudoscalar meson");
        }
        List<String> names = study.ensembles().stream().map(Study.Ensemble::name).toList();
        x.drop().stream().filter(d -> !names.contains(d)).forEach(d ->
            problem("extrapolation.drop", "there is no ensemble '" + d + "'", Nearest.advice(d, names)));
        if (new HashSet<>(x.terms()).size() < x.terms().size()) {
            problem("extrapolation.terms", "a term stands twice", "remove one");
        }
        long left = names.stream().filter(n -> !x.drop().contains(n)).count();
        long terms = x.terms().stream().distinct().count();
        if (left < terms + 1) {
            problem("extrapolation.terms", "a constant and " + terms + " terms cannot be determined by " + left + " ensembles", "drop a term or add an ensemble");
        }
    }
}
