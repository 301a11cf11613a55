package org.whither.io.command;

import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.whither.samples.GridSize;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Size of the grid on which a sample seal is computed. */
final class GridOption {
    private static final Pattern SIZE = Pattern.compile("(\\d{1,6})\\s*[x×,]\\s*(\\d{1,6})");

    @Spec(Spec.Target.MIXEE)
    private CommandSpec spec;

    @Option(
            names = "--grid",
            paramLabel = "NxM",
            description = "Cells of the grid, circumferential x radial, as in 64x112 (default: the seal's own).")
    private String size;

    /** The size, or null where none is given. */
    GridSize size() {
        if (size == null) {
            return null;
        }
        Matcher matcher = SIZE.matcher(size);
        if (!matcher.matches()) {
            throw new ParameterException(
                    spec.commandLine(), "--grid is \"" + size + "\"; expected two whole numbers such as 64x112");
        }
        try {
            return new GridSize(Integer.parseInt(matcher.group(1)), Integer.parseInt(matcher.group(2)));
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), "--grid: " + e.getMessage());
        }
    }
}
