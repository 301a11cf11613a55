package org.whither.trace;

/** Watches a path grow. */
@FunctionalInterface
public interface StepObserver {
    /**
     * Called once for each step that is kept, in order of time.
     *
     * @param step the step; valid only during the call
     */
    void step(PathStep step);
}
