/**
 * From the results of core to pixels in memory, by OpenGL without a display and without a GPU.
 */
package org.whither.render;
