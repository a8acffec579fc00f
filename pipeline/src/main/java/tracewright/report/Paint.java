package tracewright.report;

/**
 * How a drawing names its colours: by CSS class inside the report, where they follow dark mode and print, or written out in a
 * file of its own. A group sets {@code color}; lines and areas below it use {@code currentColor}.
 */
enum Paint {
    PAGE {
        @Override
        String[] series(int i) {
            return new String[] {"class", "s" + (i % Series.COUNT + 1)};
        }

        @Override
        String[] ink() {
            return new String[] {"class", "ink"};
        }

        @Override
        String[] faint() {
            return new String[] {"class", "faint"};
        }

        @Override
        String[] paper() {
            return new String[] {"class", "paper"};
        }
    },
    STANDALONE {
        @Override
        String[] series(int i) {
            return new String[] {"color", Series.of(i).light()};
        }

        @Override
        String[] ink() {
            return new String[] {"color", "#16202b"};
        }

        @Override
        String[] faint() {
            return new String[] {"color", "#c9d0d6"};
        }

        @Override
        String[] paper() {
            return new String[] {"fill", "#ffffff"};
        }
    };

    /** Colour number i of the drawing, for a group. */
    abstract String[] series(int i);

    /** Colour of text and frame, for a group. */
    abstract String[] ink();

    /** Colour of guide lines, for a group. */
    abstract String[] faint();

    /** Filling of open markers and of the ground, for a shape. */
    abstract String[] paper();
}
