/**
 * Invented seals of an invented plant, and the film solver that computes their fields. {@link
 * org.whither.samples.SampleSeals} is the door.
 *
 * <p>The way of a film: a JSON description in the resources → {@link org.whither.samples.SealDescription} (read and
 * checked by SealReader) → FaceModel (grid lines through all edges, film thickness of each cell) → FilmProblem →
 * FilmSolver (Newton's method on FilmEquations, a multi-point flux approximation; BalanceMatrix solves the linear systems
 * in EliminationOrder) → {@link org.whither.film.Film} with the pressure of each cell and exact face mass flows.
 *
 * <p><b>Frame.</b> All recesses are cut into the rotor, so a film is steady in, and computed in, the frame that turns with
 * the rotor; the stator then moves with −Ω r. A feed is an annulus of the stator, the same all round.
 *
 * <p><b>Bearing number</b> here is that of a cell: how far rotation carries the gas against what pressure differences of a
 * cell's width drive.
 */
package org.whither.samples;
