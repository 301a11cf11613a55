/**
 * Gas that turns and stays: reversed flow, held gas and its zones, critical points of the flow, the age of the gas, and
 * the through-going gas that stays longest.
 *
 * <p>All places are given in the frame in which the film is steady: angle θ within the sector (rad), radius (m), and height
 * above the rotor face as a fraction σ of the film thickness. The <em>phase</em> is the angle counted from the first grid
 * line at that radius as a part of the sector, 0 … 1, so that it follows spiral grooves. Gas is <em>held</em> where it
 * stays many times longer than the through-going gas, both before and after; neighbouring held gas is a
 * <em>zone</em>.
 */
package org.whither.eddy;
