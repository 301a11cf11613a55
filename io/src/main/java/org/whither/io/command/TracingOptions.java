package org.whither.io.command;

import org.whither.eddy.EddySettings;
import org.whither.fate.SplitSettings;
import org.whither.film.Frame;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Options about the tracing. */
final class TracingOptions {
    @Spec(Spec.Target.MIXEE)
    private CommandSpec spec;

    @Option(
            names = "--frame",
            paramLabel = "FRAME",
            defaultValue = "rotating",
            description = "Frame of integration, rotating or stationary (default: ${DEFAULT-VALUE}).")
    private Frame frame;

    @Option(
            names = "--tolerance",
            paramLabel = "X",
            defaultValue = "1e-6",
            description =
                    "Error of an integration step, as a part of the film thickness and of the film's radial extent;"
                            + " 1e-12 … 1e-2 (default: ${DEFAULT-VALUE}).")
    private double tolerance;

    @Option(
            names = "--width",
            paramLabel = "X",
            defaultValue = "0.002",
            description = "Wanted width of the interval of every share (default: ${DEFAULT-VALUE}).")
    private double width;

    @Option(
            names = "--seed",
            paramLabel = "N",
            defaultValue = "1",
            description = "Seed of the releases; the same seed gives the same result (default: ${DEFAULT-VALUE}).")
    private long seed;

    @Option(
            names = "--threads",
            paramLabel = "N",
            description = "Number of threads, 1 … 1024 (default: as many as the machine has processors).")
    private Integer threads;

    Frame frame() {
        return frame;
    }

    double tolerance() {
        if (!(tolerance >= 1e-12 && tolerance <= 1e-2)) {
            throw new ParameterException(
                    spec.commandLine(), "--tolerance is " + tolerance + "; expected a number from 1e-12 to 1e-2");
        }
        return tolerance;
    }

    long seed() {
        return seed;
    }

    int threads() {
        int number = threads == null ? Runtime.getRuntime().availableProcessors() : threads;
        if (number < 1 || number > 1024) {
            throw new ParameterException(
                    spec.commandLine(), "--threads is " + number + "; expected a whole number from 1 to 1024");
        }
        return number;
    }

    SplitSettings split() {
        if (!(width >= 1e-6 && width <= 1)) {
            throw new ParameterException(
                    spec.commandLine(), "--width is " + width + "; expected a number from 1e-6 to 1");
        }
        return new SplitSettings(frame, tolerance(), width, seed, threads(), SplitSettings.MOST_TRACERS);
    }

    /** How recirculation is looked for. */
    EddySettings eddies(double patience, int budget) {
        try {
            return new EddySettings(frame, tolerance(), patience, budget, seed, threads());
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--" + e.getMessage(), e);
        }
    }
}
