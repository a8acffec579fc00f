package tracewright.fitters.goodness;

import java.util.Arrays;
import tracewright.fitters.linalg.Symmetric;

/**
 * Covariances S* of a mean as g blocks of Gaussian data would estimate them if S were the truth; E(S*) = S. With S = C C^T,
 * <pre>
 *   S* = C B B^T C^T/(g - 1),   B lower triangular, B_ii^2 chi-squared with g - i (i = 1..p), standard normal below
 * </pre>
 * Bartlett, Proc. R. Soc. Edinburgh 53 (1933) 260; with fewer blocks than points B has g - 1 columns. Where the blocks themselves are
 * wanted they are drawn as g normal vectors, minus their mean.
 */
final class SimulatedCovariances {

    private final double[] root;      // C [i][j]
    private final int points;
    private final int blocks;
    private final Normals normals;
    private final double[] vectors;   // [k][i], blocks of the last call of nextWithBlocks

    /** @param s [i][j], positive semi-definite; read */
    SimulatedCovariances(double[] s, int points, int blocks, long seed) {
        this.root = root(s, points);
        this.points = points;
        this.blocks = blocks;
        this.normals = new Normals(seed);
        this.vectors = new double[blocks * points];
    }

    /** C by eigenvalues of the correlation matrix, so that a singular S will do. */
    private static double[] root(double[] s, int p) {
        double[] scale = new double[p];
        double[] r = new double[p * p];
        for (int i = 0; i < p; i++) {
            scale[i] = Math.sqrt(s[i * p + i]);
        }
        for (int i = 0; i < p * p; i++) {
            r[i] = s[i] / scale[i / p] / scale[i % p];
        }
        Symmetric e = Symmetric.of(r, p);
        double[] c = new double[p * p];
        for (int i = 0; i < p; i++) {
            for (int k = 0; k < p; k++) {
                c[i * p + k] = scale[i] * e.vector(i, k) * Math.sqrt(Math.max(0, e.value(k)));
            }
        }
        return c;
    }

    /** The next S*, a new array [i][j]. */
    double[] next() {
        int columns = Math.min(points, blocks - 1);
        double[] b = new double[points * columns];
        for (int i = 0; i < points; i++) {
            for (int j = 0; j < Math.min(i, columns); j++) {
                b[i * columns + j] = normals.next();
            }
            if (i < columns) {
                b[i * columns + i] = Math.sqrt(normals.nextChiSquared(blocks - 1 - i));
            }
        }
        double[] cb = new double[columns * points];   // transposed, [j][i]
        for (int i = 0; i < points; i++) {
            for (int k = 0; k < points; k++) {
                double c = root[i * points + k];
                for (int j = 0; j <= Math.min(k, columns - 1); j++) {
                    cb[j * points + i] += c * b[k * columns + j];
                }
            }
        }
        return squared(cb, columns, 1 / (blocks - 1.0));
    }

    /** The next S* together with the blocks behind it, which {@link #blocks()} then gives. */
    double[] nextWithBlocks() {
        double[] n = new double[points];
        for (int k = 0; k < blocks; k++) {
            for (int i = 0; i < points; i++) {
                n[i] = normals.next();
            }
            for (int i = 0; i < points; i++) {
                double sum = 0;
                for (int l = 0; l < points; l++) {
                    sum += root[i * points + l] * n[l];
                }
                vectors[k * points + i] = sum;
            }
        }
        subtractMean();
        return squared(vectors, blocks, 1 / (blocks - 1.0));
    }

    private void subtractMean() {
        double[] mean = new double[points];
        for (int k = 0; k < blocks; k++) {
            for (int i = 0; i < points; i++) {
                mean[i] += vectors[k * points + i];
            }
        }
        for (int k = 0; k < blocks; k++) {
            for (int i = 0; i < points; i++) {
                vectors[k * points + i] -= mean[i] / blocks;
            }
        }
    }

    /** factor X^T X for X [row][point]. */
    private double[] squared(double[] x, int rows, double factor) {
        double[] s = new double[points * points];
        for (int k = 0; k < rows; k++) {
            for (int i = 0; i < points; i++) {
                double y = factor * x[k * points + i];
                for (int j = 0; j <= i; j++) {
                    s[i * points + j] += y * x[k * points + j];
                }
            }
        }
        for (int i = 0; i < points; i++) {
            for (int j = 0; j < i; j++) {
                s[j * points + i] = s[i * points + j];
            }
        }
        return s;
    }

    /** Deviations of the blocks of the last S* with blocks, copy [k][i]. */
    double[] blocks() {
        return Arrays.copyOf(vectors, vectors.length);
    }
}
