package org.whither.render;

import java.util.Objects;
import java.util.Optional;
import java.util.OptionalDouble;

/**
 * What a relief is to be like.
 *
 * @param picture size, title, background, frame and ranges
 * @param part the whole ring, or a few sectors
 * @param barPerMillimetre pressure for one mm of height, on the scale of the lengths along the face (bar/mm); empty: a
 *     round number that gives the relief a good height
 * @param camera from where it is looked at; azimuths count from the direction from the shaft to the middle of the part
 *     shown, or for the whole ring from θ = 0; empty: from high enough to look behind the ridges, and for the whole ring
 *     from the side opposite to the paths, where the slope towards the bore is seen
 */
public record ReliefSettings(
        PictureSettings picture, Part part, OptionalDouble barPerMillimetre, Optional<Viewpoint> camera) {
    /** Of the whole ring, where it has no paths: from below, as a plan lies in its picture. */
    public static final Viewpoint RING_CAMERA =
            new Viewpoint(Math.toRadians(-90), Math.toRadians(50), Math.toRadians(22));

    /** Of some sectors: from over the bore, as in a look into the gap. */
    public static final Viewpoint SECTOR_CAMERA =
            new Viewpoint(Math.toRadians(180), Math.toRadians(46), Math.toRadians(22));

    /** Checks the scale. */
    public ReliefSettings {
        Objects.requireNonNull(picture);
        Objects.requireNonNull(part);
        Objects.requireNonNull(camera);
        if (barPerMillimetre.isPresent()
                && !(barPerMillimetre.getAsDouble() > 0 && Double.isFinite(barPerMillimetre.getAsDouble()))) {
            throw new IllegalArgumentException("height scale of " + barPerMillimetre.getAsDouble()
                    + " bar per mm; expected a finite number above 0");
        }
    }

    /** The whole ring. */
    public static ReliefSettings ring(PictureSettings picture) {
        return new ReliefSettings(picture, Part.RING, OptionalDouble.empty(), Optional.empty());
    }

    /** A few sectors. */
    public static ReliefSettings sector(PictureSettings picture) {
        return new ReliefSettings(picture, Part.SECTOR, OptionalDouble.empty(), Optional.empty());
    }
}
