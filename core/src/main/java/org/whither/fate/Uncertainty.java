package org.whither.fate;

import java.util.OptionalDouble;

/**
 * What the shares of a split are uncertain by, each kind on its own.
 *
 * @param integration what a tenth of the tolerance changes
 * @param sampling the widest interval of a share of an origin, from the maps
 * @param closure |all inflow − all outflow| / all inflow of the field
 * @param flowCorrection share of the flows of the cells that had to be changed to balance them; empty where the
 *     interpolation does not balance them
 */
public record Uncertainty(Integration integration, double sampling, double closure, OptionalDouble flowCorrection) {
    /**
     * The same tracers followed once more with another tolerance.
     *
     * @param tolerance the other tolerance: a tenth, or ten times where that would be below the smallest
     * @param tracers how many were followed once more; with none the other numbers are not numbers
     * @param changedEnds share of the gas whose destination changes
     * @param residenceChange median of the relative change of the residence time
     */
    public record Integration(double tolerance, int tracers, double changedEnds, double residenceChange) {}
}
