package tracewright.report;

import java.util.List;
import tracewright.results.Results;

/** The end of the page: warnings, choices, provenance. */
final class ClosingSections {

    private ClosingSections() {
    }

    record Warnings(Results results, Html html) implements HtmlReport.Section {
        @Override
        public String title() {
            return "Warnings";
        }

        @Override
        public void write() {
            if (results.warnings().isEmpty()) {
                html.leaf("p", "None.");
                return;
            }
            html.open("ol");
            results.warnings().forEach(w -> html.leaf("li", w));
            html.close("ol");
        }
    }

    record Choices(Results results, Html html) implements HtmlReport.Section {
        @Override
        public String title() {
            return "Choices made";
        }

        @Override
        public boolean present() {
            return !results.study().choices().isEmpty();
        }

        @Override
        public void write() {
            html.leaf("p", "What the study file asked for or left to its defaults; each can be changed there and the analysis repeated.", "class", "key");
            Table table = Table.open(html, "Choices of the study", Columns.words("Choice", "Setting"));
            results.study().choices().forEach((key, value) -> table.row(key).text(value));
            table.close();
        }
    }

    record Origin(Results results, Provenance provenance, Html html) implements HtmlReport.Section {
        @Override
        public String title() {
            return "Provenance";
        }

        @Override
        public void write() {
            Table table = Table.open(html, "Where these numbers come from", Columns.words("What", "Value"));
            table.row("study").text(results.study().name());
            table.row("program").text("Tracewright " + provenance.programVersion());
            table.row("resampling").text(results.study().resampling());
            table.row("seed").text(Long.toString(results.study().seed()));
            provenance.entries().forEach((what, value) -> table.row(what).text(value));
            table.close();
            html.leaf("p", "The same study, inputs and seed give the same report, byte for byte. Beside this page, " + String.join(", ", FILES) + ".");
        }

        private static final List<String> FILES = List.of("results.json holds every number with full digits", "samples.h5 their samples and covariance",
            "budget.csv the budgets as a table", "plots the figures with their numbers",
            "and provenance.json the resolved study, the cuts and the digest of every input file");
    }
}
