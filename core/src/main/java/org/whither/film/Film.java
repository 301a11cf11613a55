package org.whither.film;

import java.util.Optional;

/**
 * One steady gas film at one operating point.
 *
 * @param heading what it is and where it comes from
 * @param conditions the operating point
 * @param gas the gas
 * @param grid the grid of one sector
 * @param faces the seal faces
 * @param velocityFrame the observer who measured the velocities and mass flows of {@code field}
 * @param steadyIn the frame in which the field is steady, in which θ of the grid is measured
 * @param field what was computed
 * @param supply the feed, where there is one
 */
public record Film(
        Heading heading,
        Conditions conditions,
        Gas gas,
        FilmGrid grid,
        RingFaces faces,
        Frame velocityFrame,
        Frame steadyIn,
        FieldData field,
        Optional<Supply> supply) {

    /**
     * What a film is and where it comes from.
     *
     * @param title what it is
     * @param origin what computed it
     * @param created when, ISO 8601
     */
    public record Heading(String title, String origin, String created) {}

    /** Angular speed of the frame in which the film is steady, seen from the stator (rad/s). */
    public double steadyFrameSpeed() {
        return steadyIn.angularSpeed(conditions.rotationRate());
    }

    /** Whether a cell index belongs to the feed. */
    public boolean feeds(int cell) {
        return supply.isPresent() && supply.get().feeds(cell);
    }
}
