/**
 * Where the gas goes: the borders of the film and their mass flows, releases that stand for equal shares of a flow,
 * maps of a border into patches of one fate, and the table of origins and destinations with its interval.
 */
package org.whither.fate;
