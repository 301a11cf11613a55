package org.whither.eddy;

import java.util.Optional;
import org.whither.film.Correction;
import org.whither.film.Film;
import org.whither.film.FilmFlow;

/**
 * The same paths, timed by a clock that goes slower near the faces, as the gas does: where 1 s passes, it shows 4σ(1 − σ)
 * s, which is 1 s in the middle of the film. Gas that only creeps along a face because it sticks to it takes no longer by this clock than the gas beside it: in a
 * plain film, where a tracer at height σ takes t/(6σ(1 − σ)), all take the same. Gas that turns in a zone stays for ever
 * by either clock. Only in the frame in which the film is steady.
 */
final class ProfileClock implements FilmFlow {
    private static final double SLOWEST = 1e-7;

    private final FilmFlow flow;

    ProfileClock(FilmFlow flow) {
        this.flow = flow;
    }

    @Override
    public Film film() {
        return flow.film();
    }

    @Override
    public int layers() {
        return flow.layers();
    }

    @Override
    public double level(int k) {
        return flow.level(k);
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        flow.rates(i, j, k, theta, r, sigma, rates);
        double slow = 1 / Math.max(SLOWEST, 4 * sigma * (1 - sigma));
        rates[0] *= slow;
        rates[1] *= slow;
        rates[2] *= slow;
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return flow.pressure(i, j, k, theta, r, sigma);
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return flow.density(i, j, k, theta, r, sigma);
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        return flow.rotorZ(i, j, theta, r);
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return flow.thickness(i, j, theta, r);
    }

    @Override
    public double supplyFlow(int i, int j) {
        return flow.supplyFlow(i, j);
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        return flow.radialFlowBelow(i, j, sigma);
    }

    @Override
    public Optional<Correction> correction() {
        return flow.correction();
    }

    @Override
    public String interpolation() {
        return flow.interpolation();
    }
}
