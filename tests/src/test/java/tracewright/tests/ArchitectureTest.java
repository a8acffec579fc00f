package tracewright.tests;

import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static com.tngtech.archunit.library.dependencies.SlicesRuleDefinition.slices;
import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.tngtech.archunit.core.domain.JavaClasses;
import com.tngtech.archunit.core.importer.ClassFileImporter;
import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.regex.Pattern;
import java.util.stream.Stream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Test;

/** The order of the house: which package may import which, and what no package may do. Tag: law. */
@DisplayNameGeneration(ReplaceUnderscores.class)
class ArchitectureTest {

    /** The packages of the program along the flow of data; imports run from later to earlier only. */
    private static final List<String> ORDER = List.of("study", "readers", "cuts", "correlators", "extraction", "renormalization", "extrapolation", "budget",
        "results", "report");

    /** Packages above the line: they may use everything on it, and each other in this order. */
    private static final List<String> ABOVE = List.of("synth", "analysis", "cli");

    private static final JavaClasses PROGRAM = new ClassFileImporter().importPackages("tracewright").that(
        com.tngtech.archunit.base.DescribedPredicate.describe("are main classes", c -> !c.getName().startsWith("tracewright.tests")));

    private static String pattern(String name) {
        return "tracewright." + name + "..";
    }

    @Test
    void given_the_packages_of_the_program_when_imports_are_followed_then_none_points_forward() {
        List<String> all = new ArrayList<>(ORDER);
        all.addAll(ABOVE);
        int checked = 0;
        for (int i = 0; i < all.size(); i++) {
            for (int j = i + 1; j < all.size(); j++) {
                noClasses().that().resideInAPackage(pattern(all.get(i))).should().dependOnClassesThat().resideInAPackage(pattern(all.get(j)))
                    .check(PROGRAM);
                checked++;
            }
        }
        assertEquals(all.size() * (all.size() - 1) / 2, checked);
        for (String name : all) {
            assertTrue(PROGRAM.stream().anyMatch(c -> c.getPackageName().startsWith("tracewright." + name)), "package " + name + " holds no class");
        }
    }

    @Test
    void given_any_package_when_it_is_listed_then_it_has_a_place_in_the_order() {
        List<String> strangers = PROGRAM.stream().map(c -> c.getPackageName().split("\\.")).filter(p -> p.length > 1).map(p -> p[1]).distinct()
            .filter(p -> !p.equals("fitters") && !ORDER.contains(p) && !ABOVE.contains(p)).toList();
        assertEquals(List.of(), strangers);
    }

    @Test
    void given_the_library_when_its_imports_are_followed_then_it_opens_no_file_reads_no_clock_prints_nothing_and_knows_no_program() {
        noClasses().that().resideInAPackage("tracewright.fitters..").should().dependOnClassesThat()
            .resideInAnyPackage("java.io..", "java.nio.file..", "java.time..", "java.net..", "java.util.logging..").check(PROGRAM);
        noClasses().that().resideInAPackage("tracewright.fitters..").should().accessField(System.class, "out").orShould().accessField(System.class, "err")
            .orShould().callMethod(System.class, "currentTimeMillis").orShould().callMethod(System.class, "nanoTime").check(PROGRAM);
        for (String name : ORDER) {
            noClasses().that().resideInAPackage("tracewright.fitters..").should().dependOnClassesThat().resideInAPackage(pattern(name)).check(PROGRAM);
        }
    }

    @Test
    void given_all_packages_when_grouped_by_name_then_there_is_no_cycle() {
        slices().matching("tracewright.(*)..").should().beFreeOfCycles().check(PROGRAM);
        slices().matching("tracewright.fitters.(*)..").should().beFreeOfCycles().check(PROGRAM);
    }

    @Test
    void given_the_sources_when_searched_then_elementary_functions_are_the_reproducible_ones_and_formats_name_their_locale() throws IOException {
        Pattern elementary = Pattern.compile("(?<!Strict)Math\\.(exp|log|log10|pow|sin|cos|tan|tanh|sinh|cosh|cbrt|expm1|log1p|fma)\\(");
        Pattern format = Pattern.compile("String\\.format\\((?!\\s*(java\\.util\\.)?Locale\\.ROOT)|\\.formatted\\(|\\.to(Lower|Upper)Case\\(\\)");
        List<String> found = new ArrayList<>();
        int files = 0;
        for (Path source : sources()) {
            files++;
            String text = Files.readString(source, StandardCharsets.UTF_8);
            for (Pattern p : List.of(elementary, format)) {
                p.matcher(text).results().forEach(m -> found.add(source.getFileName() + ": " + m.group()));
            }
        }
        assertFalse(files < 50, "only " + files + " source files found; the search looks in the wrong place");
        assertEquals(List.of(), found);
    }

    private static List<Path> sources() throws IOException {
        List<Path> all = new ArrayList<>();
        for (String module : List.of("fitters", "pipeline")) {
            try (Stream<Path> tree = Files.walk(Path.of("..", module, "src", "main", "java"))) {
                tree.filter(p -> p.toString().endsWith(".java")).sorted().forEach(all::add);
            }
        }
        return all;
    }
}
