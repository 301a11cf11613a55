package org.whither.render;

import java.util.List;

/** What an animation moves over or through: the whole ring, drawn in mm, x along θ = 0 of the frame of view at time 0. */
interface Terrain {
    /** The drawn height of a point of the film (mm); the angle is that of the frame in which the film is steady (rad). */
    double height(double steadyTheta, double radius, double z);

    /**
     * The things that do not follow the gas.
     *
     * @param filmTurn how far the film has turned, seen from the frame of view (rad)
     * @param statorTurn how far the stator has turned, seen from there (rad)
     * @param eye an eye close by, beside which things come first, and beside which alone they cast shadows; or null
     *     where all is seen from afar (mm)
     */
    List<Scene.Item> items(double filmTurn, double statorTurn, double[] eye);

    /** Whether the terrain hides a place from an eye (mm), the film having turned so far (rad). */
    boolean hidden(double[] place, double[] eye, double filmTurn);

    /** A good height for an eye that follows gas (mm). */
    double eyeHeight(double steadyTheta, double radius, double gasHeight, double behind);

    /** The height at which an eye looks, where the gas is (mm). */
    double aimHeight(double gasHeight, double eyeHeight);

    /** A usual distance of the eye behind the gas (mm). */
    double usualDistance();

    /** Angle of view from the lower to the upper edge (rad). */
    double fieldOfView();

    /** Radius of tubes (mm). */
    double tubeRadius();

    /** Where the light comes from, for an eye that looks along an azimuth (rad). */
    Scene.Light light(double azimuth);

    /** The lowest drawn height of all (mm). */
    double lowest();

    /** The highest drawn height of all (mm). */
    double highest();

    /** The line that says how it is drawn. */
    String words();
}
