/**
 * The commands of the program, one class each, and what they share: options, progress, exit statuses. A command reads its
 * input, asks core, samples and render for results, and hands them to {@code org.whither.io.result} to be written.
 */
package org.whither.io.command;
