/**
 * The film-field layout on disk: an open HDF5 layout for one gas film, published in {@code io/LAYOUT.md}.
 *
 * <p>{@link org.whither.io.hdf5.FieldReader} and {@link org.whither.io.hdf5.FieldWriter} are the doors; {@code Layout}
 * holds every name of the layout once. Types of the HDF5 library stay inside this package, and so do its exceptions: a
 * damaged file is told as {@link org.whither.io.file.RefusedInput} in one sentence.
 */
package org.whither.io.hdf5;
