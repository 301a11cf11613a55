/**
 * Files and folders as wholes: what was read and refused, and results that appear under their final name only when they
 * are complete.
 *
 * <p><b>Words.</b> A result is <em>whole</em> when every byte of it is on the disk. It is assembled beside its final
 * name, under a hidden name that ends in {@code .partial}, and moved into place; a run that fails or is interrupted
 * leaves nothing behind.
 */
package org.whither.io.file;
