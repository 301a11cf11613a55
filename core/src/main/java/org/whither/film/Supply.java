package org.whither.film;

import java.util.Optional;

/** The feed: the cells through whose seal face supply gas enters the film. */
public final class Supply {
    /**
     * The rings between which an annular feed lies.
     *
     * @param from inner radius (m)
     * @param to outer radius (m)
     */
    public record Annulus(double from, double to) {}

    private final Face face;
    private final boolean[] cells;
    private final double[] massFlux;
    private final Annulus annulus;

    private Supply(Face face, boolean[] cells, double[] massFlux, Annulus annulus) {
        this.face = face;
        this.cells = cells.clone();
        this.massFlux = massFlux == null ? null : massFlux.clone();
        this.annulus = annulus;
    }

    /**
     * A feed of any shape.
     *
     * @param face the face it lies in
     * @param cells which cells it covers, (ni − 1) × (nj − 1), row-major; copied
     * @param massFlux gas entering through each cell, (ni − 1) × (nj − 1) (kg/(m² s)), or null: it then follows from
     *     the field; copied
     */
    public static Supply ofCells(Face face, boolean[] cells, double[] massFlux) {
        return new Supply(face, cells, massFlux, null);
    }

    /**
     * An annular feed: the rows of cells whose middle radius lies between the two radii, or the row that holds their
     * middle where the annulus is narrower than a row.
     *
     * @param grid the grid
     * @param face the face it lies in
     * @param annulus its radii (m)
     * @param massFlux as in {@link #ofCells}
     */
    public static Supply ofAnnulus(FilmGrid grid, Face face, Annulus annulus, double[] massFlux) {
        boolean[] rows = new boolean[grid.cellsRadial()];
        boolean any = false;
        for (int j = 0; j < rows.length; j++) {
            double middle = 0.5 * (grid.radius(j) + grid.radius(j + 1));
            rows[j] = middle >= annulus.from() && middle <= annulus.to();
            any |= rows[j];
        }
        if (!any) {
            rows[grid.row(0.5 * (annulus.from() + annulus.to()))] = true;
        }
        boolean[] cells = new boolean[grid.cells()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < rows.length; j++) {
                cells[grid.cell(i, j)] = rows[j];
            }
        }
        return new Supply(face, cells, massFlux, annulus);
    }

    /** The face it lies in. */
    public Face face() {
        return face;
    }

    /** Whether a cell index belongs to the feed. */
    public boolean feeds(int cell) {
        return cells[cell];
    }

    /** Whether the gas entering through each cell is given. */
    public boolean hasMassFlux() {
        return massFlux != null;
    }

    /** Gas entering through a cell index (kg/(m² s)); only where {@link #hasMassFlux}. */
    public double massFlux(int cell) {
        return massFlux[cell];
    }

    /** Its radii, where it is an annulus. */
    public Optional<Annulus> annulus() {
        return Optional.ofNullable(annulus);
    }
}
