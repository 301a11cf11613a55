/**
 * All that crosses the border of the process: files, tables, pictures, the command line. The program starts here.
 */
package org.whither.io;
