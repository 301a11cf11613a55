package org.whither.io.command;

import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.file.Path;
import java.util.Locale;
import java.util.concurrent.Callable;
import org.whither.io.hdf5.FieldWriter;
import org.whither.io.result.EngineerUnits;
import org.whither.io.result.ResultJson;
import org.whither.samples.SampleSeals;
import org.whither.samples.SealDescription;
import org.whither.samples.SolvedFilm;
import org.whither.samples.SolverFacts;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Parameters;
import picocli.CommandLine.Spec;

/** Computes one of the invented seals. */
@Command(
        name = "sample",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Compute the film of one of the invented seals and write it as a field file.%n",
        description = "The seals, their plant and their operating points are invented. Without NAME, lists them.%n",
        sortOptions = false)
final class SampleCommand implements Callable<Integer> {
    @Spec
    private CommandSpec spec;

    @Parameters(index = "0", arity = "0..1", paramLabel = "NAME", description = "Name of the seal.")
    private String name;

    @Option(
            names = "--as",
            paramLabel = "FILE",
            description = "File to write (default: ./NAME.h5). An earlier file of that name is replaced.")
    private Path file;

    @Option(names = "--point", paramLabel = "POINT", description = "Operating point (default: the seal's first).")
    private String point;

    @Mixin
    private GridOption grid;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        if (name == null) {
            list();
            return ExitStatus.DONE;
        }
        SolvedFilm solved = compute(spec, name, point, grid, talk);
        Path target = file == null ? Path.of(name + ".h5") : file;
        FieldWriter.write(solved.film(), target);
        if (talk.json()) {
            talk.out().print(ResultJson.text(json(target, solved)));
            talk.out().flush();
        }
        talk.say(words(solved.facts(), solved));
        talk.say("Written: " + target);
        return ExitStatus.DONE;
    }

    private void list() {
        for (String seal : SampleSeals.names()) {
            SealDescription description = SampleSeals.describe(seal);
            talk.out().println(seal + "  " + description.title());
            for (SealDescription.OperatingPoint known : description.points()) {
                talk.out().println("    --point " + known.name() + "  " + known.note());
            }
        }
    }

    /** Computes a sample, with its faults of usage told as such. */
    static SolvedFilm compute(CommandSpec spec, String name, String point, GridOption grid, Talk talk) {
        try (Talk.Stretch stretch = talk.begin("Computing the film of the invented seal \"" + name + "\"")) {
            return SampleSeals.compute(name, point, grid.size(), stretch);
        } catch (IllegalArgumentException e) {
            throw new ParameterException(spec.commandLine(), e.getMessage());
        }
    }

    static String words(SolverFacts facts, SolvedFilm solved) {
        return String.format(
                Locale.ROOT,
                "%s%nSolved: %d Newton iterations, imbalance of a cell at most %.1e of the through-flow; highest pressure"
                        + " %s at r = %s; opening force %.1f N; power spent on the film %.1f W.",
                solved.film().heading().title(),
                facts.iterations(),
                facts.residual(),
                EngineerUnits.pressure(facts.peakPressure()),
                EngineerUnits.millimetres(facts.peakRadius()),
                facts.openingForce(),
                facts.filmPower());
    }

    private ObjectNode json(Path target, SolvedFilm solved) {
        SolverFacts facts = solved.facts();
        ObjectNode root = JsonNodeFactory.instance.objectNode();
        root.put("result", "sample");
        root.put("version", 1);
        root.put("seal", name);
        root.put("file", target.toString());
        root.put("title", solved.film().heading().title());
        root.put("iterations", facts.iterations());
        root.put("residual", facts.residual());
        root.put("mass_closure", facts.massClosure());
        root.put("supply_in", facts.supplyIn());
        root.put("inner_out", facts.innerOut());
        root.put("outer_out", facts.outerOut());
        root.put("outer_in", facts.outerIn());
        root.put("opening_force", facts.openingForce());
        root.put("film_power", facts.filmPower());
        root.put("peak_pressure", facts.peakPressure());
        root.put("peak_radius", facts.peakRadius());
        return root;
    }
}
