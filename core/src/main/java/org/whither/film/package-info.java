/**
 * The gas film of a face seal: its geometry, its gas, its pressure, and how the gas in it moves.
 *
 * <p><b>Words.</b> The <em>rotor</em> is the rotating ring, the <em>stator</em> the stationary one; their faces bound the
 * film. The <em>film thickness</em> h is the distance between the faces along the shaft. σ is the height above the rotor
 * face as a fraction of the film thickness: 0 at the rotor, 1 at the stator. A <em>sector</em> is the part of the ring
 * after which everything repeats.
 *
 * <p><b>Axes.</b> θ is positive by the right-hand rule about +z; z points from the rotor face to the stator face. Positive
 * rotation turns the rotor towards +θ. Indices: i circumferential, j radial (from the inner to the outer diameter), k
 * across the film (from the rotor face). Nodes number {@code ni × nj}, cells {@code (ni − 1) × (nj − 1)}; arrays are
 * row-major, so node (i, j) is at {@code i * nj + j}.
 *
 * <p><b>Units.</b> SI throughout; angles in rad; pressures absolute.
 *
 * <p><b>Frames.</b> {@link org.whither.film.Frame#ROTATING} turns with the rotor. A film is steady in one frame, and θ
 * means the angle in that frame.
 *
 * <p>Nothing here knows files or pictures.
 */
package org.whither.film;
