package org.whither.io.result;

/** What the closure of its border flows allows to be said of a field: the same for a check and for a split. */
enum ClosureVerdict {
    /** They close. */
    CLOSES,
    /** They are off by more than {@link #DOUBTFUL_ABOVE}: no share is surer than that. */
    DOUBTFUL,
    /** They are off by more than {@link #NO_RESULT_ABOVE}: what is computed from the field is no result. */
    NO_RESULT;

    /** Closure beyond which a field is doubtful, as a share of the inflow. */
    static final double DOUBTFUL_ABOVE = 0.005;

    /** Closure beyond which a field gives no result, as a share of the inflow. */
    static final double NO_RESULT_ABOVE = 0.02;

    /**
     * The verdict.
     *
     * @param closure (all inflow − all outflow) / all inflow; not a number where nothing enters, which is no result
     * @return the verdict
     */
    static ClosureVerdict of(double closure) {
        double off = Math.abs(closure);
        if (off <= DOUBTFUL_ABOVE) {
            return CLOSES;
        }
        return off <= NO_RESULT_ABOVE ? DOUBTFUL : NO_RESULT;
    }

    /** As written in results. */
    String word() {
        return switch (this) {
            case CLOSES -> "closes";
            case DOUBTFUL -> "doubtful";
            case NO_RESULT -> "no result";
        };
    }
}
