package org.whither.fate;

import org.whither.film.Correction;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * Mass flows over the borders of the film, for the whole ring (kg/s), from integrals over the borders: no tracer has a
 * part in them. Each is 0 or more.
 *
 * @param supplyIn supply gas entering through the feed
 * @param supplyOut film gas leaving through the feed
 * @param innerIn gas entering over the inner diameter
 * @param innerOut gas leaving over the inner diameter
 * @param outerIn gas entering over the outer diameter
 * @param outerOut gas leaving over the outer diameter
 */
public record BorderBalance(
        double supplyIn, double supplyOut, double innerIn, double innerOut, double outerIn, double outerOut) {

    /**
     * The balance of a film.
     *
     * @param flow its motion
     * @return its border flows
     */
    public static BorderBalance of(FilmFlow flow) {
        FilmGrid grid = flow.film().grid();
        double supplyIn = 0;
        double supplyOut = 0;
        double innerIn = 0;
        double innerOut = 0;
        double outerIn = 0;
        double outerOut = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double supply = flow.supplyFlow(i, j);
                supplyIn += Math.max(0, supply);
                supplyOut += Math.max(0, -supply);
            }
            for (int part = 0; part < flow.profileParts(); part++) {
                double low = flow.profilePart(part);
                double high = flow.profilePart(part + 1);
                double inner = flow.radialFlowBelow(i, 0, high) - flow.radialFlowBelow(i, 0, low);
                double outer =
                        flow.radialFlowBelow(i, grid.nj() - 1, high) - flow.radialFlowBelow(i, grid.nj() - 1, low);
                innerIn += Math.max(0, inner);
                innerOut += Math.max(0, -inner);
                outerOut += Math.max(0, outer);
                outerIn += Math.max(0, -outer);
            }
        }
        int sectors = grid.sectors();
        return new BorderBalance(
                supplyIn * sectors,
                supplyOut * sectors,
                innerIn * sectors,
                innerOut * sectors,
                outerIn * sectors,
                outerOut * sectors);
    }

    /** All that enters (kg/s). */
    public double inflow() {
        return supplyIn + innerIn + outerIn;
    }

    /** All that leaves (kg/s). */
    public double outflow() {
        return supplyOut + innerOut + outerOut;
    }

    /** (all inflow − all outflow) / all inflow; not a number where nothing enters. */
    public double closure() {
        return (inflow() - outflow()) / inflow();
    }

    /**
     * How far a field closes by itself: before a conserving flow balances it, or as {@link #closure}, whichever is worse.
     *
     * @param flow the motion of the gas
     * @param balance its border flows
     * @return (all inflow − all outflow) / all inflow
     */
    public static double closureOfField(FilmFlow flow, BorderBalance balance) {
        double before = flow.correction().map(Correction::closure).orElse(0.0);
        double now = balance.closure();
        return Math.abs(before) > Math.abs(now) ? before : now;
    }
}
