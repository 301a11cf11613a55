/**
 * From the results of core to pixels in memory, by OpenGL without a display and without a GPU.
 *
 * <p>{@link org.whither.render.Plan} draws the face seen along the shaft, {@link org.whither.render.Gap} a look into the
 * film with its thickness drawn too large, {@link org.whither.render.Relief} the pressure as height, {@link
 * org.whither.render.Meridian} a section along the radius. Each
 * builds a {@link org.whither.render.Scene} (meshes, materials, a light) and a {@link org.whither.render.Camera}, which are
 * plain data ({@link org.whither.render.ReliefScene} and {@link org.whither.render.GapScene} for stills and animations); {@link org.whither.render.Canvas} is the only class that
 * speaks OpenGL, {@link org.whither.render.HeadlessGL} the only one that starts it, and
 * {@link org.whither.render.Ink} writes words and legends over the drawn scene. Shaders are files beside the classes.
 *
 * <p><b>Words.</b> <em>Pixels</em> count from the upper left corner of the picture. Colours are sRGB, 0xRRGGBB. Scenes are
 * in mm; what comes from core is in SI. The <em>paper</em> is the background of a picture.
 *
 * <p>Where OpenGL cannot be started, {@link org.whither.render.NoOpenGL} says in one sentence what to install; numbers do
 * not depend on it. Nothing here knows files other than its own shaders.
 */
package org.whither.render;
