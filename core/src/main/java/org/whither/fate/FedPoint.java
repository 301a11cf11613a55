package org.whither.fate;

import org.whither.trace.PathEnd;
import org.whither.trace.Release;

/**
 * A point of an inflow border with the end of the tracer released there: for maps of where the gas goes.
 *
 * @param release the point
 * @param end the end of its tracer
 */
public record FedPoint(Release release, PathEnd end) {}
