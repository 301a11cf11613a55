package org.whither.samples;

import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.film.Gas;

/**
 * An invented seal: its faces, its feed, its gas and the operating points it is computed at. All in SI.
 *
 * @param name what it is called on the command line
 * @param title one line
 * @param description what it is, and that it is invented
 * @param plant the invented plant it runs in
 * @param gas the gas, at the film temperature
 * @param isentropicExponent ratio of specific heats of the gas
 * @param temperature film temperature (K)
 * @param innerRadius inner radius of the faces (m)
 * @param outerRadius outer radius of the faces (m)
 * @param innerSide what lies at the inner diameter
 * @param outerSide what lies at the outer diameter
 * @param clearance film thickness over the lands, at the inner diameter (m)
 * @param coning by how much the film is thicker at the outer diameter, linear in the radius (m)
 * @param sectors how many equal sectors make the ring
 * @param recesses what is cut into the rotor face, if anything
 * @param feed the annulus of the stator face through which supply gas enters
 * @param points operating points, the first one being the one it is made for
 * @param grid grid size unless another is asked for
 */
public record SealDescription(
        String name,
        String title,
        String description,
        String plant,
        Gas gas,
        double isentropicExponent,
        double temperature,
        double innerRadius,
        double outerRadius,
        String innerSide,
        String outerSide,
        double clearance,
        double coning,
        int sectors,
        Optional<Recesses> recesses,
        Feed feed,
        List<OperatingPoint> points,
        GridSize grid) {

    /** What is cut into the rotor face, the same in every sector. */
    public sealed interface Recesses permits SpiralGrooves, Pockets {}

    /** Which way grooves drive the gas while the rotor turns towards +θ. */
    public enum Pumping {
        /** Towards the inner diameter. */
        INWARD,
        /** Towards the outer diameter. */
        OUTWARD
    }

    /**
     * Logarithmic spiral grooves of even depth, one in each sector.
     *
     * @param angle angle between groove and circumference (rad)
     * @param grooveToLand width of a groove over the width of a land
     * @param depth depth below the land (m)
     * @param from inner radius (m)
     * @param to outer radius (m)
     * @param pumping which way they drive the gas while the rotor turns towards +θ
     */
    public record SpiralGrooves(
            double angle, double grooveToLand, double depth, double from, double to, Pumping pumping)
            implements Recesses {
        /** Share of the circumference that is groove. */
        public double grooveShare() {
            return grooveToLand / (1 + grooveToLand);
        }

        /** dθ/d ln r along a groove (rad). */
        public double turn() {
            return (pumping == Pumping.INWARD ? 1 : -1) / Math.tan(angle);
        }
    }

    /**
     * Pockets bounded by radii and radial lines, mirrored about the middle line of each sector.
     *
     * @param pockets the pockets
     */
    public record Pockets(List<Pocket> pockets) implements Recesses {}

    /**
     * One pocket and its mirror image; where pockets overlap the deeper one counts.
     *
     * @param from inner radius (m)
     * @param to outer radius (m)
     * @param angleFrom nearer end, from the middle line of the sector (rad); 0 joins pocket and mirror image
     * @param angleTo farther end, from the middle line of the sector (rad)
     * @param depth depth below the land (m)
     */
    public record Pocket(double from, double to, double angleFrom, double angleTo, double depth) {}

    /**
     * The feed.
     *
     * @param from inner radius (m)
     * @param to outer radius (m)
     * @param restriction what holds the supply gas back
     */
    public record Feed(double from, double to, Restriction restriction) {}

    /** What holds the supply gas back before it enters the film. */
    public sealed interface Restriction permits PorousLayer, Orifices, GivenFlow {}

    /**
     * A porous layer, q = K (pₛ² − p²).
     *
     * @param permeance K (kg/(m² s Pa²))
     */
    public record PorousLayer(double permeance) implements Restriction {}

    /**
     * Orifices spread evenly over the annulus.
     *
     * @param dischargeCoefficient discharge coefficient
     * @param openShare their share of the annulus' area
     */
    public record Orifices(double dischargeCoefficient, double openShare) implements Restriction {}

    /** A flow set from outside, evenly over the annulus; the operating points give it. */
    public record GivenFlow() implements Restriction {}

    /**
     * An operating point.
     *
     * @param name what it is called on the command line
     * @param note what it is
     * @param rotationRate rotation rate, positive towards +θ (rad/s)
     * @param pressureInner absolute pressure at the inner diameter (Pa)
     * @param pressureOuter absolute pressure at the outer diameter (Pa)
     * @param pressureSupply absolute pressure before the restriction (Pa); absent with a given flow
     * @param supplyFlow supply mass flow of the whole ring (kg/s); present with a given flow only
     */
    public record OperatingPoint(
            String name,
            String note,
            double rotationRate,
            double pressureInner,
            double pressureOuter,
            OptionalDouble pressureSupply,
            OptionalDouble supplyFlow) {}
}
