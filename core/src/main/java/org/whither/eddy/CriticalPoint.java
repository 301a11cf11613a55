package org.whither.eddy;

import java.util.List;

/**
 * A point at which a flow stands still, seen from the frame in which the film is steady.
 *
 * @param flow which flow
 * @param place where; θ is 0 in the ring-averaged flow, σ is a half in the flow of whole columns
 * @param kind what the flow does around it
 * @param rates real parts of the eigenvalues of the gradient of the rates (1/s)
 * @param turns their imaginary parts (rad/s)
 */
public record CriticalPoint(Flow flow, Place place, Kind kind, List<Double> rates, List<Double> turns) {
    /** Which flow stands still. */
    public enum Flow {
        /** The gas itself: all three rates are zero. */
        GAS,
        /** The mean flow of the columns over the face. */
        COLUMNS,
        /** The mean over the ring, in the plane of radius and film thickness. */
        MERIDIAN
    }

    /** After M. S. Chong, A. E. Perry and B. J. Cantwell, Phys. Fluids A 2 (1990) 765–777. */
    public enum Kind {
        /** All paths go out from it. */
        REPELLING_NODE("repelling node", 1),
        /** All paths run into it. */
        ATTRACTING_NODE("attracting node", 1),
        /** Paths run in one way and out another. */
        SADDLE("saddle", -1),
        /** Paths turn round it outwards. */
        REPELLING_FOCUS("repelling focus", 1),
        /** Paths turn round it inwards. */
        ATTRACTING_FOCUS("attracting focus", 1),
        /** Paths turn round it and close. */
        CENTRE("centre", 1);

        private final String words;
        private final int index;

        Kind(String words, int index) {
            this.words = words;
            this.index = index;
        }

        /** As told in results. */
        public String words() {
            return words;
        }

        /** Its Poincaré index in a plane flow: 1, or −1 for a saddle. */
        public int index() {
            return index;
        }
    }

    /** Keeps its own copies. */
    public CriticalPoint {
        rates = List.copyOf(rates);
        turns = List.copyOf(turns);
    }
}
