/**
 * Units of measurement at the border of the process: what a spelling means, and how a number in it becomes SI. Inside
 * the program every number is in SI, so nothing but reading and writing needs this package.
 */
package org.whither.io.units;
