package org.whither.film;

/**
 * What had to be changed in a field so that its flow conserves mass, and how far it closed before.
 *
 * @param closure (all inflow − all outflow) / all inflow over the feed and the two diameters as the field gave them,
 *     column by column; 0 where nothing enters
 * @param share Σ|change| / Σ|flow| over the faces of all cells
 * @param largestShare the largest share of the flow through the faces of one cell that was changed
 */
public record Correction(double closure, double share, double largestShare) {}
