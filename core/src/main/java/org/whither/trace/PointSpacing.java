package org.whither.trace;

/** How densely the points of a path lie that is handed on; a matter of its continuous extension, not of the steps taken. */
public sealed interface PointSpacing {
    /**
     * So many points, equal in time, the first and the last at the ends of the path. A path that lasts no time has one.
     *
     * @param count how many, at least 2
     */
    record Equal(int count) implements PointSpacing {
        /** Checks the count. */
        public Equal {
            if (count < 2) {
                throw new IllegalArgumentException(count + " points a path; expected at least 2");
            }
        }
    }

    /**
     * As few points as keep straight lines between them near the path: run through evenly from point to point, they are at
     * no time further from it than the tolerance, in x and y, and in height. Where the height of a path jumps, over the
     * edge of a groove, there are two points of the same time.
     *
     * @param tolerance part of the film's radial extent along the film, and of the film thickness across it
     */
    record Within(double tolerance) implements PointSpacing {
        /** Checks the tolerance. */
        public Within {
            if (!(tolerance >= 1e-9 && tolerance < 1)) {
                throw new IllegalArgumentException("tolerance " + tolerance + "; expected 1e-9 … 1");
            }
        }
    }
}
