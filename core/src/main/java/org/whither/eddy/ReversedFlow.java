package org.whither.eddy;

import java.util.List;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * Gas that runs against the way its column goes.
 *
 * @param volumeShare share of the film's volume in which the radial velocity opposes the net radial mass flow of its
 *     column
 * @param uphillShare share of the film's volume in columns whose net mass flow, seen from the frame in which the film is
 *     steady, runs up the pressure
 * @param face share of the film thickness that runs so at each cell, (ni − 1) × (nj − 1), row-major
 * @param across share of the volume that runs so in equal parts of the film thickness, from the rotor face
 * @param uphill whether the column of each cell runs up the pressure, as {@code face}
 */
public record ReversedFlow(
        double volumeShare, double uphillShare, List<Double> face, List<Double> across, List<Boolean> uphill) {
    /** Parts of the film thickness in {@link #across}. */
    public static final int HEIGHTS = 20;

    /** Places a layer at which a column of a full field is looked at; a film field has one layer and needs more. */
    private static final int PLACES = 4;

    /** Below this share of the fastest radial flow of its column, gas does not run at all. */
    private static final double STILL = 1e-9;

    /** Keeps its own copies. */
    public ReversedFlow {
        face = List.copyOf(face);
        across = List.copyOf(across);
        uphill = List.copyOf(uphill);
    }

    /**
     * Finds the reversed flow of a film.
     *
     * @param flow its motion
     */
    public static ReversedFlow of(FilmFlow flow) {
        FilmGrid grid = flow.film().grid();
        int parts = Math.max(1, (HEIGHTS + flow.layers() * PLACES - 1) / (flow.layers() * PLACES));
        int places = parts * PLACES;
        double[] sigma = new double[flow.layers() * places];
        double[] part = new double[sigma.length];
        for (int k = 0; k < flow.layers(); k++) {
            double thick = (flow.level(k + 1) - flow.level(k)) / places;
            for (int n = 0; n < places; n++) {
                sigma[k * places + n] = flow.level(k) + (n + 0.5) * thick;
                part[k * places + n] = thick;
            }
        }
        Double[] face = new Double[grid.cells()];
        Boolean[] uphill = new Boolean[grid.cells()];
        double[] against = new double[HEIGHTS];
        double[] all = new double[HEIGHTS];
        double volume = 0;
        double reversed = 0;
        double climbing = 0;
        double[] rates = new double[3];
        double[] radial = new double[sigma.length];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                double column = flow.thickness(i, j, theta, r) * grid.cellArea(i, j);
                double netRadial = 0;
                double netAround = 0;
                double fastest = 0;
                for (int n = 0; n < sigma.length; n++) {
                    int k = n / places;
                    flow.rates(i, j, k, theta, r, sigma[n], rates);
                    double density = flow.density(i, j, k, theta, r, sigma[n]);
                    radial[n] = density * rates[1];
                    netRadial += radial[n] * part[n];
                    netAround += density * rates[0] * r * part[n];
                    fastest = Math.max(fastest, Math.abs(radial[n]));
                }
                double share = 0;
                for (int n = 0; n < sigma.length; n++) {
                    int bin = Math.min(HEIGHTS - 1, (int) (sigma[n] * HEIGHTS));
                    all[bin] += part[n] * column;
                    if (radial[n] * netRadial < 0 && Math.abs(radial[n]) > STILL * fastest) {
                        share += part[n];
                        against[bin] += part[n] * column;
                    }
                }
                int cell = grid.cell(i, j);
                face[cell] = share;
                uphill[cell] =
                        netRadial * slopeRadial(flow, i, j, theta, r) + netAround * slopeAround(flow, i, j, theta, r)
                                > 0;
                volume += column;
                reversed += share * column;
                climbing += uphill[cell] ? column : 0;
            }
        }
        Double[] across = new Double[HEIGHTS];
        for (int n = 0; n < HEIGHTS; n++) {
            across[n] = all[n] > 0 ? against[n] / all[n] : 0;
        }
        return new ReversedFlow(reversed / volume, climbing / volume, List.of(face), List.of(across), List.of(uphill));
    }

    /** ∂p/∂r at the middle of a cell (Pa/m). */
    private static double slopeRadial(FilmFlow flow, int i, int j, double theta, double r) {
        FilmGrid grid = flow.film().grid();
        double step = 0.25 * (grid.radius(j + 1) - grid.radius(j));
        // Along the middle line of the cell, less what the lean of that line adds.
        double lean = 0.5 * (grid.lineSlope(i, j) + grid.lineSlope(i + 1, j));
        double along = (middlePressure(flow, i, j, theta + lean * step, r + step)
                        - middlePressure(flow, i, j, theta - lean * step, r - step))
                / (2 * step);
        return along - lean * r * slopeAround(flow, i, j, theta, r);
    }

    /** (1/r) ∂p/∂θ at the middle of a cell (Pa/m). */
    private static double slopeAround(FilmFlow flow, int i, int j, double theta, double r) {
        FilmGrid grid = flow.film().grid();
        double step = 0.25 * (grid.lineTheta(i + 1, j, r) - grid.lineTheta(i, j, r));
        return (middlePressure(flow, i, j, theta + step, r) - middlePressure(flow, i, j, theta - step, r))
                / (2 * step * r);
    }

    private static double middlePressure(FilmFlow flow, int i, int j, double theta, double r) {
        return flow.pressure(i, j, Spot.layer(flow, 0.5), theta, r, 0.5);
    }

    /** Share of the film thickness that runs against its column at a cell. */
    public double face(int cell) {
        return face.get(cell);
    }
}
