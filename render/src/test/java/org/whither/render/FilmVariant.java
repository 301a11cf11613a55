package org.whither.render;

import org.whither.film.Film;
import org.whither.film.FilmFlow;

/** A film that is like another one but for what a test changes. */
class FilmVariant implements FilmFlow {
    private final FilmFlow like;

    FilmVariant(FilmFlow like) {
        this.like = like;
    }

    @Override
    public Film film() {
        return like.film();
    }

    @Override
    public int layers() {
        return like.layers();
    }

    @Override
    public double level(int k) {
        return like.level(k);
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        like.rates(i, j, k, theta, r, sigma, rates);
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return like.pressure(i, j, k, theta, r, sigma);
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return like.density(i, j, k, theta, r, sigma);
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        return like.rotorZ(i, j, theta, r);
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return like.thickness(i, j, theta, r);
    }

    @Override
    public double supplyFlow(int i, int j) {
        return like.supplyFlow(i, j);
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        return like.radialFlowBelow(i, j, sigma);
    }

    @Override
    public String interpolation() {
        return like.interpolation();
    }
}
