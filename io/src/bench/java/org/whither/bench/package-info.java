/**
 * Benchmarks, run by the Maven profile {@code bench} alone and no part of the program. {@link org.whither.bench.Bars}
 * starts them and prints how they stand to the bars that the program is held to. Only ratios of figures of one run mean
 * anything.
 */
package org.whither.bench;
