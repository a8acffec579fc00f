package tracewright.report;

/**
 * The six colours of the plots in fixed order, each with a marker shape of its own, so that series can be told apart in black
 * and white print and by colour-blind readers. Lightness differs as well as hue: found by a search for the largest smallest
 * distance in CIELAB between any two, as seen with full, red-blind, green-blind and blue-blind vision (the test repeats the
 * measurement). Dark variants are for a dark page.
 */
enum Series {
    BLUE("#4e84e9", "#b4ccfb") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x - 2.3, y) + "a2.3 2.3 0 1 0 4.6 0a2.3 2.3 0 1 0 -4.6 0z";
        }
    },
    RUST("#ca6b19", "#c6803f") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x - 2.05, y - 2.05) + "h4.1v4.1h-4.1z";
        }
    },
    GREEN("#0a3c30", "#12e6b0") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x, y - 2.9) + "l2.9 2.9l-2.9 2.9l-2.9 -2.9z";
        }
    },
    PLUM("#7f107f", "#ec3fe6") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x, y - 2.8) + "l2.7 4.7h-5.4z";
        }
    },
    OLIVE("#52440e", "#e5d43f") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x, y + 2.8) + "l2.7 -4.7h-5.4z";
        }
    },
    SLATE("#797f85", "#82888e") {
        @Override
        String marker(double x, double y) {
            return "M" + at(x - 0.9, y - 2.7) + "h1.8v1.8h1.8v1.8h-1.8v1.8h-1.8v-1.8h-1.8v-1.8h1.8z";
        }
    };

    static final int COUNT = 6;

    private final String light;
    private final String dark;

    Series(String light, String dark) {
        this.light = light;
        this.dark = dark;
    }

    /** Series of layer number i; after six they begin again. */
    static Series of(int i) {
        return values()[i % COUNT];
    }

    String light() {
        return light;
    }

    String dark() {
        return dark;
    }

    /** Outline of the marker centred at (x, y), about five units wide. */
    abstract String marker(double x, double y);

    private static String at(double x, double y) {
        return Numbers.coordinate(x) + " " + Numbers.coordinate(y);
    }
}
