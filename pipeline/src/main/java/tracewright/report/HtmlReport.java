package tracewright.report;

import static java.util.Objects.requireNonNull;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.io.Writer;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import tracewright.results.Results;

/**
 * Writes the report of a run: one HTML page that needs nothing else, readable on a screen, a telephone and A4 paper.
 * Style sheet and the script that sorts tables are resources of this package and stand inside the page; no value of the study
 * ever enters the script.
 */
public final class HtmlReport {

    private final Results results;
    private final Provenance provenance;
    private final Html html = new Html();
    private final Anchors anchors = new Anchors();
    private final List<Section> sections = new ArrayList<>();

    private HtmlReport(Results results, Provenance provenance) {
        this.results = requireNonNull(results, "results");
        this.provenance = requireNonNull(provenance, "provenance");
        Gallery gallery = new Gallery(html, anchors);
        FitTables fits = new FitTables(html);
        sections.add(new SummarySection(results, html, gallery));
        for (Results.EnsembleSummary e : results.ensembles()) {
            sections.add(new EnsembleSection(results, e, html, gallery, fits));
        }
        sections.add(new ExtrapolationSection(results, html, gallery, fits));
        sections.add(new ErrorSection(results, html));
        sections.add(new ClosingSections.Warnings(results, html));
        sections.add(new ClosingSections.Choices(results, html));
        sections.add(new ClosingSections.Origin(results, provenance, html));
    }

    /** One part of the page with an entry in the navigation. */
    interface Section {

        String title();

        /** Whether there is anything to show; an empty section is left out. */
        default boolean present() {
            return true;
        }

        /** Everything below the heading. */
        void write();
    }

    /** The report with the program's version as the only provenance. */
    public static void write(Results results, Writer writer) throws IOException {
        write(results, Provenance.ofThisProgram(), writer);
    }

    /** The report; the writer is neither flushed nor closed. Use UTF-8. */
    public static void write(Results results, Provenance provenance, Writer writer) throws IOException {
        writer.write(new HtmlReport(results, provenance).page());
    }

    private String page() {
        html.raw("<!DOCTYPE html>\n").open("html", "lang", "en");
        head();
        html.open("body");
        header();
        List<Section> shown = sections.stream().filter(Section::present).toList();
        List<String> ids = shown.stream().map(s -> anchors.of(s.title())).toList();
        html.open("div", "class", "columns");
        navigation(shown, ids);
        html.open("main");
        for (int i = 0; i < ids.size(); i++) {
            html.open("section", "id", ids.get(i)).leaf("h2", shown.get(i).title());
            shown.get(i).write();
            html.close("section");
        }
        html.close("main").close("div");
        html.open("script").raw(resource("report.js")).close("script");
        return html.close("body").close("html").toString();
    }

    private void head() {
        html.open("head").empty("meta", "charset", "utf-8");
        html.empty("meta", "name", "viewport", "content", "width=device-width, initial-scale=1");
        html.empty("meta", "name", "color-scheme", "content", "light dark");
        html.leaf("title", results.study().name() + " \u2013 Tracewright report");
        html.open("style").raw(seriesColours() + resource("report.css")).close("style");
        html.close("head");
    }

    /** The palette as CSS variables, from the one table of colours. */
    private static String seriesColours() {
        StringBuilder light = new StringBuilder();
        StringBuilder dark = new StringBuilder();
        StringBuilder classes = new StringBuilder();
        for (int i = 0; i < Series.COUNT; i++) {
            String name = "--s" + (i + 1);
            light.append(name).append(":").append(Series.of(i).light()).append(";");
            dark.append(name).append(":").append(Series.of(i).dark()).append(";");
            classes.append(".s").append(i + 1).append("{color:var(").append(name).append(")}\n");
        }
        return "\n:root{" + light + "}\n@media screen and (prefers-color-scheme:dark){:root{" + dark + "}}\n" + classes;
    }

    private void header() {
        html.open("header").leaf("h1", results.study().name());
        html.leaf("p", "Hadron-mass budget from lattice correlators. Tracewright " + provenance.programVersion() + "; "
            + Phrase.count(results.ensembles().size(), "ensemble") + ", " + Phrase.count(results.quantities().size(), "published number") + ", "
            + Phrase.count(results.figures().size(), "figure") + ".");
        html.close("header");
    }

    private void navigation(List<Section> shown, List<String> ids) {
        html.open("nav", "aria-label", "Contents").open("ul");
        for (int i = 0; i < ids.size(); i++) {
            html.open("li").leaf("a", shown.get(i).title(), "href", "#" + ids.get(i)).close("li");
        }
        html.close("ul").close("nav");
    }

    private static String resource(String name) {
        try (InputStream in = Optional.ofNullable(HtmlReport.class.getResourceAsStream(name))
            .orElseThrow(() -> new IllegalStateException("resource " + name + " is missing from the program"))) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException("resource " + name + " cannot be read", e);
        }
    }
}
