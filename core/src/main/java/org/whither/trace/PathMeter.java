package org.whither.trace;

import org.whither.film.Film;

/**
 * Measures paths while they grow, from the start and the end of every step. A step never goes beyond its piece of the
 * film, within which the pressure is monotonic both ways and a path bends little, so no more points are needed.
 */
public final class PathMeter implements StepObserver {
    private final double frameSpeed;
    private double theta;
    private double radius;
    private double z;
    private double length;
    private double lowest;
    private double highest;
    private boolean begun;

    /**
     * A meter.
     *
     * @param film the film
     * @param direction whether the paths run with or against time
     */
    public PathMeter(Film film, Direction direction) {
        this.frameSpeed = film.steadyFrameSpeed() * direction.sign();
        begin();
    }

    /** Begins a new path. */
    public void begin() {
        begun = false;
        length = 0;
        lowest = Double.NaN;
        highest = Double.NaN;
    }

    @Override
    public void step(PathStep step) {
        if (!begun) {
            PathPoint first = step.at(0);
            begun = true;
            move(first);
            lowest = first.pressure();
            highest = first.pressure();
        }
        PathPoint point = step.at(1);
        double fromTheta = theta;
        double fromRadius = radius;
        double fromZ = z;
        move(point);
        double around = 0.5 * (fromRadius + radius) * (theta - fromTheta);
        double out = radius - fromRadius;
        double across = z - fromZ;
        length += Math.sqrt(around * around + out * out + across * across);
        lowest = Math.min(lowest, point.pressure());
        highest = Math.max(highest, point.pressure());
    }

    private void move(PathPoint point) {
        theta = point.steadyTheta() + frameSpeed * point.time();
        radius = point.radius();
        z = point.z();
    }

    /** The path so far. */
    public PathMeasure measure() {
        return new PathMeasure(length, lowest, highest);
    }
}
