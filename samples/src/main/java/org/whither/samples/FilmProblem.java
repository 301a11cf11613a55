package org.whither.samples;

/**
 * One film to be computed, in the frame that turns with the rotor.
 *
 * @param grid the grid
 * @param thickness film thickness of each cell (m); kept
 * @param feed law of the supply gas of each cell, null where the face is sealed; kept
 * @param feedArea area of each cell on the face (m²); kept
 * @param viscosity dynamic viscosity (Pa·s)
 * @param specificGasConstant specific gas constant (J/(kg K))
 * @param temperature film temperature (K)
 * @param rotationRate rotation rate, positive towards +θ (rad/s)
 * @param pressureInner absolute pressure at the inner diameter (Pa)
 * @param pressureOuter absolute pressure at the outer diameter (Pa)
 */
record FilmProblem(
        SheetGrid grid,
        double[] thickness,
        FeedLaw[] feed,
        double[] feedArea,
        double viscosity,
        double specificGasConstant,
        double temperature,
        double rotationRate,
        double pressureInner,
        double pressureOuter) {

    /** Area of each cell on the face as the film's grid has it (m²). */
    static double[] cellAreas(SheetGrid grid) {
        var filmGrid = grid.toFilmGrid();
        double[] area = new double[grid.cells()];
        for (int i = 0; i < grid.nx(); i++) {
            for (int j = 0; j < grid.nr(); j++) {
                area[grid.cell(i, j)] = filmGrid.cellArea(i, j);
            }
        }
        return area;
    }

    /** The same film at another rotation rate (rad/s). */
    FilmProblem turning(double rate) {
        return new FilmProblem(
                grid,
                thickness,
                feed,
                feedArea,
                viscosity,
                specificGasConstant,
                temperature,
                rate,
                pressureInner,
                pressureOuter);
    }
}
