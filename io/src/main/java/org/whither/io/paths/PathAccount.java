package org.whither.io.paths;

import java.util.List;
import org.whither.film.Frame;
import org.whither.trace.Course;

/**
 * What is told of a run in every file of paths.
 *
 * @param file name of the field file
 * @param title its title
 * @param sha256 its checksum
 * @param frame frame of integration
 * @param course which way tracers are followed
 * @param until until when, in words
 * @param tolerance error of an integration step
 * @param seed seed of the releases
 * @param points how densely points lie, in words
 * @param interpolation how the motion of the gas was formed
 * @param releases the releases as the user asked for them
 */
public record PathAccount(
        String file,
        String title,
        String sha256,
        Frame frame,
        Course course,
        String until,
        double tolerance,
        long seed,
        String points,
        String interpolation,
        List<String> releases) {}
