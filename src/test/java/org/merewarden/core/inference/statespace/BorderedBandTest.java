package org.merewarden.core.inference.statespace;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.data.Offset.offset;

import java.util.Arrays;
import java.util.SplittableRandom;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.MatrixUtils;
import org.junit.jupiter.api.Test;

/** Against dense linear algebra of the mathematics library. */
class BorderedBandTest {
    private static final int BAND = 9;
    private static final int BORDERS = 2;
    private final SplittableRandom random = new SplittableRandom(3);
    private final BorderedBand band = new BorderedBand(BAND, BORDERS);
    private final double[][] full = new double[BAND + BORDERS][BAND + BORDERS];

    private void fill(double diagonal) {
        band.clear();
        for (int i = 0; i < BAND; i++) {
            band.diagonal[i] = full[i][i] = diagonal + random.nextDouble();
            if (i > 0) {
                band.below[i] = full[i][i - 1] = full[i - 1][i] = random.nextDouble() - 0.5;
            }
            if (i > 1) {
                band.below2[i] = full[i][i - 2] = full[i - 2][i] = random.nextDouble() - 0.5;
            }
            for (int j = 0; j < BORDERS; j++) {
                band.border[j][i] = full[BAND + j][i] = full[i][BAND + j] = random.nextDouble() - 0.5;
            }
        }
        for (int j = 0; j < BORDERS; j++) {
            band.corner[j][j] = full[BAND + j][BAND + j] = diagonal + 3;
        }
        band.corner[1][0] = band.corner[0][1] = full[BAND][BAND + 1] = full[BAND + 1][BAND] = 0.4;
    }

    @Test
    void determinantAndSolutionAreThoseOfTheDenseMatrix() {
        fill(3);
        LUDecomposition lu = new LUDecomposition(new Array2DRowRealMatrix(full));
        assertThat(band.factor()).isTrue();
        assertThat(band.logDeterminant()).isEqualTo(Math.log(lu.getDeterminant()), offset(1e-12));
        double[] rhs = random.doubles(BAND + BORDERS).toArray();
        double[] out = new double[rhs.length];
        band.solve(rhs, out);
        double[] dense = lu.getSolver().solve(MatrixUtils.createRealVector(rhs)).toArray();
        assertThat(out).containsExactly(dense, offset(1e-12));
        BorderedBand copy = new BorderedBand(BAND, BORDERS);
        copy.copy(band);
        copy.multiply(rhs, out);
        assertThat(out).containsExactly(new Array2DRowRealMatrix(full).operate(rhs), offset(1e-12));
    }

    @Test
    void anIndefiniteMatrixIsRefused() {
        fill(-0.5);
        assertThat(band.factor()).isFalse();
        fill(3);
        band.corner[0][0] = 0.01;
        assertThat(band.factor()).isFalse();
    }

    /** 40,000 draws: a covariance is good to 5 standard errors, 5 √2 / √40,000 of the largest variance. */
    @Test
    void drawsHaveTheInverseAsCovariance() {
        fill(2);
        assertThat(band.factor()).isTrue();
        double[][] inverse = new LUDecomposition(new Array2DRowRealMatrix(full))
                .getSolver()
                .getInverse()
                .getData();
        int size = BAND + BORDERS;
        double[][] sum = new double[size][size];
        double[] z = new double[size];
        double[] product = new double[size];
        int draws = 40_000;
        for (int k = 0; k < draws; k++) {
            double squares = band.sample(random, z);
            band.multiply(z, product);
            double expected = MatrixUtils.createRealVector(z).dotProduct(MatrixUtils.createRealVector(product));
            assertThat(squares).isEqualTo(expected, offset(1e-9));
            for (int i = 0; i < size; i++) {
                for (int j = 0; j < size; j++) {
                    sum[i][j] += z[i] * z[j] / draws;
                }
            }
        }
        double largest =
                Arrays.stream(inverse).flatMapToDouble(Arrays::stream).max().orElseThrow();
        for (int i = 0; i < size; i++) {
            assertThat(sum[i]).containsExactly(inverse[i], offset(5 * Math.sqrt(2.0 / draws) * largest));
        }
    }
}
