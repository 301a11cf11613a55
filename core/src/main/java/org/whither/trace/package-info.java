/**
 * Following massless particles of gas, <em>tracers</em>, through a film.
 *
 * <p>A tracer's state is (θ, r, σ): its angle in the chosen frame, unwrapped, its radius, and its height above the rotor
 * face as a fraction of the film thickness. {@link org.whither.trace.RightHandSide} says how a state changes,
 * {@link org.whither.trace.DormandPrince54} takes steps of controlled error, {@link org.whither.trace.Tracer} follows one
 * tracer from its {@link org.whither.trace.Release} until it leaves the film, and
 * {@link org.whither.trace.StepObserver} watches. Every tracer has exactly one {@link org.whither.trace.PathEnd}, which
 * is data, never an exception.
 */
package org.whither.trace;
