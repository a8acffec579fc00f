package tracewright.report;

import java.util.function.Consumer;
import tracewright.fitters.sampled.SampledNumber;

/** A table of the page: scrolls sideways when it is too wide, sorts by a click on a column's head. */
final class Table {

    private static final String[] NUMBER = {"class", "n"};

    private final Html html;
    private boolean rowOpen;

    private Table(Html html) {
        this.html = html;
    }

    /** Opens a table whose caption says what it holds. */
    static Table open(Html html, String caption, Columns columns) {
        html.open("div", "class", "wide", "role", "region", "tabindex", "0", "aria-label", caption).open("table", "class", "sortable");
        html.leaf("caption", caption);
        html.open("thead").open("tr");
        for (Columns.Column c : columns.list()) {
            html.leaf("th", c.head(), Pen.join(c.number() ? NUMBER : new String[0], "scope", "col"));
        }
        html.close("tr").close("thead").open("tbody");
        return new Table(html);
    }

    /** Begins a row with its name. */
    Table row(String head) {
        return begin(head);
    }

    /** Begins a row that stands out. */
    Table mainRow(String head) {
        return begin(head, "class", "main");
    }

    private Table begin(String head, String... attributes) {
        endRow();
        html.open("tr", attributes).leaf("th", head, "scope", "row");
        rowOpen = true;
        return this;
    }

    /** A cell of words; long ones get room. */
    Table text(String text) {
        if (text.length() > LONG) {
            html.leaf("td", text, "class", "say");
        } else {
            html.leaf("td", text);
        }
        return this;
    }

    private static final int LONG = 18;

    /** A cell that takes the room it can get. */
    Table sentence(String text) {
        html.leaf("td", text, "class", "sentence");
        return this;
    }

    /** A cell that the caller writes. */
    Table cell(Consumer<Html> content) {
        html.open("td");
        content.accept(html);
        html.close("td");
        return this;
    }

    Table none() {
        html.leaf("td", Numbers.NONE, "class", "n", "data-v", "");
        return this;
    }

    Table count(long n) {
        html.leaf("td", Long.toString(n), "class", "n", "data-v", Long.toString(n));
        return this;
    }

    /** A number already written out, with the value by which it sorts. */
    Table number(String shown, double value) {
        html.leaf("td", shown, "class", "n", "data-v", Numbers.sortKey(value));
        return this;
    }

    Table number(double value, double error) {
        return number(Numbers.paper(value, error), value);
    }

    Table number(SampledNumber x) {
        return number(Published.paper(x), x.central());
    }

    /** A value in MeV with its fraction of the mass below. */
    Table withFraction(SampledNumber value, SampledNumber fraction) {
        return withNote(Published.paper(value), Numbers.percent(fraction.central(), Published.error(fraction)), value.central());
    }

    /** A number with a smaller line below, and the value by which it sorts. */
    Table withNote(String shown, String note, double value) {
        html.open("td", "class", "n", "data-v", Numbers.sortKey(value)).text(shown).leaf("small", note).close("td");
        return this;
    }

    void close() {
        endRow();
        html.close("tbody").close("table").close("div");
    }

    private void endRow() {
        if (rowOpen) {
            html.close("tr");
            rowOpen = false;
        }
    }
}
