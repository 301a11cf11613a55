/**
 * Invented seals of an invented plant, and the film solver that computes their fields.
 */
package org.whither.samples;
