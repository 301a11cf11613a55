/**
 * Paths to take away: where tracers are released, and the files in which their paths leave the program.
 *
 * <p>Paths are never held: {@link org.whither.io.paths.PathExport} follows a few at a time and hands them, in the order of
 * their releases, to {@link org.whither.io.paths.PathOutput}s, which write as they go.
 */
package org.whither.io.paths;
