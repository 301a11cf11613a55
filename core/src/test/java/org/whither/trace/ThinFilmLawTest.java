package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.RadialCase;

/** Tracers in the exact radial film, with no grid between the law and the tracer. */
class ThinFilmLawTest {
    private static final FilmGrid GRID = RadialCase.grid(4, RadialCase.radii(12, 10, 2e-4), 6, 0.3);

    /** The exact velocities of the radial film outside the feed (Reynolds 1886), asked for at any point of any piece. */
    static final FilmFlow EXACT = new FilmFlow() {
        private final FilmFlow onGrid = new ConservingFlow(RadialCase.film(GRID, true));

        @Override
        public Film film() {
            return onGrid.film();
        }

        @Override
        public int layers() {
            return 1;
        }

        @Override
        public double level(int k) {
            return k;
        }

        @Override
        public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
            rates[0] = -RadialCase.OMEGA * sigma;
            rates[1] = -RadialCase.H * RadialCase.H / (2 * 1.78e-5) * RadialCase.gradient(r) * sigma * (1 - sigma);
            rates[2] = 0;
        }

        @Override
        public double pressure(int i, int j, int k, double theta, double r, double sigma) {
            return RadialCase.pressure(r);
        }

        @Override
        public double density(int i, int j, int k, double theta, double r, double sigma) {
            return RadialCase.NITROGEN.density(RadialCase.pressure(r), 300);
        }

        @Override
        public double rotorZ(int i, int j, double theta, double r) {
            return 0;
        }

        @Override
        public double thickness(int i, int j, double theta, double r) {
            return RadialCase.H;
        }

        @Override
        public double supplyFlow(int i, int j) {
            return onGrid.supplyFlow(i, j);
        }

        @Override
        public double radialFlowBelow(int i, int j, double sigma) {
            return onGrid.radialFlowBelow(i, j, sigma);
        }

        @Override
        public String interpolation() {
            return "exact";
        }
    };

    private static PathEnd.Left follow(double sigma, boolean outwards, double tolerance) {
        double from = RadialCase.FEED_RADIUS * (1 + (outwards ? 1e-15 : -1e-15));
        TraceSettings settings = new TraceSettings(Frame.STATIONARY, Direction.FORWARD, tolerance, 100);
        return assertInstanceOf(
                PathEnd.Left.class, new Tracer(EXACT, settings).follow(new Release(0.1, from, sigma, 1)));
    }

    /**
     * With ζ = 1 − σ a tracer needs t̄ / (6 ζ (1 − ζ)) and makes Ω t̄ / (2π · 6 (1 − ζ)) turns, t̄ = 1.88363299e-3 s to the inner
     * and 2.86044579e-3 s to the outer diameter: the base case of the project's check values, from the closed form. To 1e-8,
     * the digits given.
     */
    @Test
    void follow_exactFilm_obeysTheLawToItsDigits() {
        for (double zeta : new double[] {0.25, 0.5, 0.75, 0.9}) {
            for (boolean outwards : new boolean[] {true, false}) {
                PathEnd.Left end = follow(1 - zeta, outwards, 1e-11);
                double mean = outwards ? RadialCase.OUTER_TIME : RadialCase.INNER_TIME;
                assertEquals(outwards ? PathEnd.Border.OUTER : PathEnd.Border.INNER, end.border());
                assertEquals(mean / (6 * zeta * (1 - zeta)), end.time(), 1e-8 * end.time());
                double turns = (end.position().stationaryTheta() - 0.1) / (2 * Math.PI);
                assertEquals(RadialCase.OMEGA * mean / (2 * Math.PI * 6 * (1 - zeta)), turns, 1e-8 * turns);
            }
        }
    }

    /**
     * Residence between parallel plates, weighted by flow: F = (1 + 1/(3θ)) √(1 − 2/(3θ)), θ = t/t̄ (P. V. Danckwerts, Chem.
     * Eng. Sci. 2, 1953; the profile's closed form): F(1) = 0.769800, F(2) = 0.952579, median 0.758105. Releases at the
     * middles of equal shares of the flow across the film, of which there are 2000.
     */
    @Test
    void follow_equalFlows_haveThePlatesResidenceDistribution() {
        int count = 2000;
        double[] times = new double[count];
        for (int n = 0; n < count; n++) {
            times[n] = follow(height((n + 0.5) / count), true, 1e-7).time() / RadialCase.OUTER_TIME;
        }
        Arrays.sort(times);
        assertEquals(0.769800, shareBelow(times, 1), 1.5 / count);
        assertEquals(0.952579, shareBelow(times, 2), 1.5 / count);
        assertEquals(0.758105, 0.5 * (times[count / 2 - 1] + times[count / 2]), 1e-3);
        assertEquals(2.0 / 3, times[0], 1e-5);
    }

    private static double shareBelow(double[] times, double bound) {
        return (double) Arrays.stream(times).filter(time -> time < bound).count() / times.length;
    }

    /** The height below which a share of a parabolic flow runs: 3σ² − 2σ³ = share. */
    static double height(double share) {
        double low = 0;
        double high = 1;
        for (int n = 0; n < 60; n++) {
            double middle = 0.5 * (low + high);
            if (middle * middle * (3 - 2 * middle) < share) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return low;
    }

    /** Error against work: a tenth of the tolerance costs more steps and gives a smaller error, down to rounding. */
    @Test
    void follow_smallerTolerance_isMoreAccurate() {
        List<Double> errors = new ArrayList<>();
        for (double tolerance : new double[] {1e-4, 1e-6, 1e-8, 1e-10}) {
            double exact = RadialCase.OUTER_TIME / (6 * 0.3 * 0.7);
            errors.add(Math.abs(follow(0.7, true, tolerance).time() - exact) / exact);
        }
        assertEquals(0, errors.get(0), 1e-3);
        assertEquals(0, errors.get(1), 1e-5);
        assertEquals(0, errors.get(2), 1e-7);
        assertEquals(0, errors.get(3), 1e-8);
    }
}
