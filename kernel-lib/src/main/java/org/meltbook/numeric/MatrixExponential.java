package org.meltbook.numeric;

import java.util.Arrays;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.MatrixUtils;
import org.apache.commons.math3.linear.RealMatrix;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;

/**
 * The exponential of a small square matrix, and with it the exact solution of linear equations with constant
 * coefficients.
 *
 * <p>Scaling and squaring with the diagonal Padé form of degree 13, after N. J. Higham, SIAM J. Matrix Anal. Appl. 26
 * (2005) 1179 (coefficients and the bound 5.37 from memory; checked against closed forms).
 */
public final class MatrixExponential {
    private static final double[] PADE = {
        64764752532480000.0,
        32382376266240000.0,
        7771770303897600.0,
        1187353796428800.0,
        129060195264000.0,
        10559470521600.0,
        670442572800.0,
        33522128640.0,
        1323241920.0,
        40840800.0,
        960960.0,
        16380.0,
        182.0,
        1.0
    };
    private static final double BOUND = 5.371920351148152;

    private MatrixExponential() {}

    /**
     * exp(A).
     *
     * @throws RangeException if A is not square or holds a number that is not finite
     */
    public static RealMatrix of(RealMatrix a) {
        double norm = a.getNorm();
        if (!a.isSquare() || !Double.isFinite(norm)) {
            throw new RangeException("a matrix exponential needs a square matrix of finite numbers, found "
                    + a.getRowDimension() + " by " + a.getColumnDimension() + " with norm " + norm);
        }
        int halvings = norm > BOUND ? Math.getExponent(norm / BOUND) + 1 : 0;
        RealMatrix power = pade(a.scalarMultiply(Math.scalb(1.0, -halvings)));
        for (int i = 0; i < halvings; i++) {
            power = power.multiply(power);
        }
        return power;
    }

    /**
     * y(t) of dy/dt = A y + b from y(0), exact for any A, singular or not.
     *
     * @param a     A in 1/s, n by n
     * @param b     b, length n
     * @param start y(0), length n
     * @param time  t in s, zero or more
     */
    public static Doubles propagate(RealMatrix a, double[] b, double[] start, double time) {
        int n = b.length;
        RealMatrix augmented = MatrixUtils.createRealMatrix(n + 1, n + 1);
        augmented.setSubMatrix(a.getData(), 0, 0);
        augmented.setColumn(n, Arrays.copyOf(b, n + 1));
        RealMatrix flow = of(augmented.scalarMultiply(time));
        double[] state = Arrays.copyOf(start, n + 1);
        state[n] = 1;
        return Doubles.of(Arrays.copyOf(flow.operate(state), n));
    }

    private static RealMatrix pade(RealMatrix a) {
        RealMatrix one = MatrixUtils.createRealIdentityMatrix(a.getRowDimension());
        RealMatrix a2 = a.multiply(a);
        RealMatrix a4 = a2.multiply(a2);
        RealMatrix a6 = a4.multiply(a2);
        RealMatrix odd = a.multiply(a6.multiply(sum(null, a2, a4, a6, 7)).add(sum(one, a2, a4, a6, 1)));
        RealMatrix even = a6.multiply(sum(null, a2, a4, a6, 6)).add(sum(one, a2, a4, a6, 0));
        return new LUDecomposition(even.subtract(odd)).getSolver().solve(even.add(odd));
    }

    /** PADE[k] 1 + PADE[k+2] A² + PADE[k+4] A⁴ + PADE[k+6] A⁶, without the first term if {@code one} is null. */
    private static RealMatrix sum(RealMatrix one, RealMatrix a2, RealMatrix a4, RealMatrix a6, int k) {
        RealMatrix rest = a2.scalarMultiply(PADE[k + 2])
                .add(a4.scalarMultiply(PADE[k + 4]))
                .add(a6.scalarMultiply(PADE[k + 6]));
        return one == null ? rest : rest.add(one.scalarMultiply(PADE[k]));
    }
}
