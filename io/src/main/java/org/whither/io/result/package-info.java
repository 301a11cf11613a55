/**
 * Results as they leave the program: JSON for machines, plain words and the engineer's units for people.
 */
package org.whither.io.result;
