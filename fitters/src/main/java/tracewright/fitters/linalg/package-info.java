/**
 * The little linear algebra that fits need, on flat row-major arrays.
 * <pre>
 *  covariance --Cholesky--&gt; L, L^-1 --Triangular--&gt; whitened data and Jacobian --Householder--&gt; step
 *  correlation --Symmetric--&gt; eigenvalues, eigenvectors
 * </pre>
 * A matrix that is not positive definite is an outcome, with the pivot that failed; nothing is repaired here.
 */
package tracewright.fitters.linalg;
