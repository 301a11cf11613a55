package org.whither.io.command;

import java.awt.image.BufferedImage;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.Callable;
import org.whither.eddy.Eddies;
import org.whither.eddy.EddySettings;
import org.whither.io.file.WholeFolder;
import org.whither.io.hdf5.FieldWriter;
import org.whither.io.picture.PictureDescription;
import org.whither.io.picture.Stills;
import org.whither.io.picture.View;
import org.whither.io.report.ReportPicture;
import org.whither.io.result.EddiesResult;
import org.whither.io.result.SplitResult;
import org.whither.render.NoOpenGL;
import org.whither.render.Quantity;
import org.whither.samples.SampleSeals;
import org.whither.samples.SolvedFilm;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Spec;

/** The whole job on the built-in sample. */
@Command(
        name = "demo",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Do the whole job on a built-in, invented seal.%n",
        description = {
            "Computes the film of an invented spiral-groove seal, writes it as a field file, finds where its supply gas"
                    + " goes and what gas stays, draws it, and makes one page of it. Writes field.h5, split.json, eddies.json with its"
                    + " tables, report.html and report.json,"
                    + " and the pictures plan.png, plan-thickness.png, plan-speed.png, plan-age.png, plan-destination.png,"
                    + " relief.png, gap.png and meridian.png into the folder, each with its description as JSON.",
            "Without usable OpenGL it still gives the numbers, says which packages pictures need, and ends with status"
                    + " 4.%n"
        },
        sortOptions = false)
final class DemoCommand implements Callable<Integer> {
    private static final Path DEFAULT_FOLDER = Path.of("demo-whither");

    @Spec
    private CommandSpec spec;

    @Mixin
    private FolderOption folder;

    @Mixin
    private GridOption grid;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        Path target = folder.or(DEFAULT_FOLDER);
        WholeFolder.check(target);
        var settings = tracing.split();
        SolvedFilm solved = SampleCommand.compute(spec, SampleSeals.names().get(0), null, grid, talk);
        talk.say(SampleCommand.words(solved.facts(), solved));
        talk.say("");
        SplitResult[] found = new SplitResult[1];
        EddiesResult[] eddies = new EddiesResult[1];
        String[] sentence = new String[1];
        WholeFolder.write(target, into -> {
            Path file = into.resolve("field.h5");
            FieldWriter.write(solved.film(), file);
            FieldInput input = FieldInput.read(file, talk);
            found[0] = SplitCommand.find(input, settings, talk);
            SplitCommand.writeNumbers(found[0], into);
            eddies[0] =
                    EddiesCommand.find(input, tracing.eddies(EddySettings.PATIENCE, ReportCommand.EDDY_TRACERS), talk);
            EddiesCommand.writeNumbers(eddies[0], into);
            List<ReportPicture> pictures = new ArrayList<>();
            Optional<String> missing = draw(input, found[0], eddies[0].eddies(), into, pictures);
            ReportCommand.write(input, found[0], eddies[0].eddies(), tracing, talk, pictures, missing, into);
            sentence[0] = missing.orElse(null);
        });
        SplitCommand.print(found[0], talk);
        talk.say("");
        talk.say(eddies[0].answer());
        talk.say("Written: " + target.toAbsolutePath());
        talk.say("The page for the plant: " + target.resolve("report.html").toAbsolutePath());
        if (sentence[0] != null) {
            talk.warn(sentence[0]);
            return ExitStatus.SHORT_OF_WANTED;
        }
        // How well the mass of a zone is known has been said; the wanted width and closure are those of the split.
        return SplitCommand.status(found[0]);
    }

    /**
     * Draws every kind of picture with its description, the plan in all its quantities, and adds those that a report shows;
     * or tells in a sentence why it could not.
     */
    private Optional<String> draw(
            FieldInput input, SplitResult result, Eddies eddies, Path into, List<ReportPicture> ofReport)
            throws IOException {
        try (Talk.Stretch stretch = talk.begin("Drawing")) {
            Pictures.needed();
            List<PictureDescription> pictures = new ArrayList<>();
            for (Quantity quantity : Quantity.values()) {
                pictures.add(PictureDescription.of(View.PLAN).showing(quantity));
            }
            for (View view : List.of(View.RELIEF, View.GAP, View.MERIDIAN)) {
                pictures.add(PictureDescription.of(view));
            }
            pictures.replaceAll(p -> p.seen(p.background(), p.seenFrom(), tracing.frame()));
            Stills.Subject computed = Pictures.subject(
                    input.flow(),
                    Pictures.few(result.split().fed()),
                    Pictures.Wanted.of(pictures, ReportPictures.PATHS, false),
                    tracing);
            Stills.Subject subject = new Stills.Subject(computed.flow(), computed.data(), eddies.zones());
            Map<View, BufferedImage> images = new EnumMap<>(View.class);
            double done = 0.4;
            for (PictureDescription picture : pictures) {
                stretch.accept(done);
                BufferedImage image = Pictures.draw(input, subject, picture, input.title(), into);
                if (picture.show() == Quantity.PRESSURE) {
                    images.put(picture.view(), image);
                }
                done += 0.6 / pictures.size();
            }
            ofReport.addAll(ReportPictures.of(input, subject, images));
            return Optional.empty();
        } catch (NoOpenGL e) {
            return Optional.of(e.getMessage());
        }
    }
}
