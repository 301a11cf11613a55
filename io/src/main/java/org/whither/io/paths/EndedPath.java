package org.whither.io.paths;

import org.whither.trace.SampledPath;

/**
 * A path with its number and what became of it.
 *
 * @param number number of the tracer, from 0
 * @param path its points
 * @param from where the gas came from, or null if it was not followed back
 * @param fate where it goes, or null if it was not followed on
 */
record EndedPath(int number, SampledPath path, Fate from, Fate fate) {}
