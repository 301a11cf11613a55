/**
 * Still pictures and their files: what a picture shows as a small JSON ({@link
 * org.whither.io.picture.PictureDescription}), from which the same picture of another field can be made; PNG files that
 * carry their facts ({@link org.whither.io.picture.PngFile}); and the drawing of a described picture of a field ({@link
 * org.whither.io.picture.Stills}).
 */
package org.whither.io.picture;
