package tracewright.report;

import java.util.Comparator;
import java.util.List;
import tracewright.results.Figure;

/** Figures of a section, side by side where the page is wide enough, under a heading for each topic. */
final class Gallery {

    private final Html html;
    private final Anchors anchors;

    Gallery(Html html, Anchors anchors) {
        this.html = html;
        this.anchors = anchors;
    }

    void byTopic(List<Figure> figures) {
        List<String> topics = figures.stream().map(Figure::topic).distinct()
            .sorted(Comparator.comparingInt(Words::topicRank).thenComparing(Comparator.naturalOrder())).toList();
        for (String topic : topics) {
            html.leaf("h3", Words.topic(topic));
            String help = Words.topicHelp(topic);
            if (!help.isEmpty()) {
                html.leaf("p", help, "class", "key");
            }
            show(figures.stream().filter(f -> f.topic().equals(topic)).toList());
        }
    }

    void show(List<Figure> figures) {
        html.open("div", "class", "gallery");
        figures.forEach(this::figure);
        html.close("div");
    }

    private void figure(Figure figure) {
        String id = anchors.of("figure-" + figure.id());
        html.open("figure", "id", id);
        html.raw(SvgPlot.inPage(figure, id));
        html.open("figcaption").open("strong");
        Markup.parse(figure.title()).writeHtml(html);
        html.close("strong").text(" ");
        Markup.parse(figure.caption()).writeHtml(html);
        long omitted = omitted(figure);
        if (omitted > 0) {
            html.leaf("em", " Not drawn, because not finite: " + omitted + (omitted == 1 ? " point." : " points."));
        }
        if (!figure.id().isEmpty()) {
            html.text(" ").leaf("code", figure.id());
        }
        html.close("figcaption").close("figure");
    }

    /** Entries of a figure that have no place on paper. */
    private static long omitted(Figure figure) {
        long n = 0;
        for (Figure.Layer layer : figure.layers()) {
            if (layer instanceof Figure.Points l) {
                n += l.points().stream().filter(p -> !PlotRange.drawable(p)).count();
            } else if (layer instanceof Figure.Band l) {
                n += l.points().stream().filter(p -> !PlotRange.drawable(p)).count();
            } else if (layer instanceof Figure.Line l) {
                n += l.points().stream().filter(p -> !PlotRange.drawable(p)).count();
            } else if (layer instanceof Figure.Bars l) {
                n += l.bars().stream().filter(p -> !PlotRange.drawable(p)).count();
            }
        }
        return n;
    }
}
