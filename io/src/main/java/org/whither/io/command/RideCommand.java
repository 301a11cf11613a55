package org.whither.io.command;

import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.IOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.List;
import java.util.Locale;
import java.util.OptionalDouble;
import java.util.Set;
import java.util.concurrent.Callable;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.whither.fate.BorderBalance;
import org.whither.fate.ReleasePlan;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.io.file.WholeFolder;
import org.whither.io.motion.GifFile;
import org.whither.io.motion.VideoFile;
import org.whither.io.result.Cautions;
import org.whither.io.result.ResultJson;
import org.whither.render.Animation;
import org.whither.render.GapSettings;
import org.whither.render.LetGo;
import org.whither.render.MotionSettings;
import org.whither.render.NoOpenGL;
import org.whither.render.PictureSettings;
import org.whither.render.Ride;
import org.whither.render.Turn;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Animations. */
@Command(
        name = "ride",
        mixinStandardHelpOptions = true,
        versionProvider = Program.Version.class,
        header = "Make an animation of a field.%n",
        description = {
            "ride: follows gas at a set distance behind it, inside the film or over the relief of the pressure, with its"
                    + " clock, revolutions, pressure and speed. turn: the eye goes once round the ring, with paths. release:"
                    + " many pieces of gas are let go at once where gas enters; their colour and shape tell where they will"
                    + " end. The picture says how many times slower than the gas it is: gas stays in a film for"
                    + " milliseconds.",
            "Writes KIND.gif and, where the program ffmpeg is on this machine, KIND.mp4 into the folder. Status 4 where"
                    + " nothing could be drawn, or a file that was asked for by name could not be written.%n"
        },
        sortOptions = false)
final class RideCommand implements Callable<Integer> {
    static final Pattern SIZE = Pattern.compile("(\\d{1,6})\\s*[x×,]\\s*(\\d{1,6})");
    private static final int MOST_TRACERS = 5000;

    /** Angle that paths shown as tubes round the ring run through at most (rad). */
    private static final double MOST_OF_THE_WAY = Math.toRadians(230);

    /** From so many paths the one to follow is chosen. */
    private static final int CANDIDATES = 64;

    /** Tracers shown beside the followed one. */
    static final int RIDE_TRACERS = 300;

    /** The kinds of animations. */
    enum Kind {
        /** Follows gas. */
        RIDE,
        /** Goes round the ring. */
        TURN,
        /** Lets gas go. */
        RELEASE
    }

    @Spec
    private CommandSpec spec;

    @Mixin
    private FieldParameter field;

    @Mixin
    private FolderOption folder;

    @Option(
            names = "--kind",
            paramLabel = "KIND",
            split = ",",
            description = "ride, turn, release, or several with commas between (default: ride).")
    private Set<Kind> kinds = EnumSet.of(Kind.RIDE);

    @Option(
            names = "--view",
            paramLabel = "VIEW",
            defaultValue = "gap",
            description = "gap: the film, its thickness drawn too large; relief: the pressure as height (default:"
                    + " ${DEFAULT-VALUE}).")
    private MotionSettings.Ground view;

    @Option(
            names = "--as",
            paramLabel = "FILES",
            split = ",",
            description = "gif, mp4, frames (single PNG files), or several with commas between (default: gif, and mp4"
                    + " where ffmpeg is there).")
    private Set<MotionFiles.As> as;

    @Option(
            names = "--from",
            paramLabel = "THETA,RADIUS,SIGMA",
            description =
                    "Where the followed gas starts: angle in the film (rad), radius (m), height over the rotor as a"
                            + " share of the film thickness (default: gas from the feed that goes the way most of it goes).")
    private String from;

    @Option(
            names = "--behind",
            paramLabel = "MM",
            description =
                    "Distance of the eye behind the followed gas, at the scale of the face, mm (default: a share of"
                            + " the face's width).")
    private Double behind;

    @Option(
            names = "--tracers",
            paramLabel = "N",
            description = "Pieces of gas let go (release), shown beside the followed one (ride), or paths (turn); 0 …"
                    + " " + MOST_TRACERS + " (default: 600, 300, 12).")
    private Integer tracers;

    @Option(
            names = "--size",
            paramLabel = "WxH",
            defaultValue = "1280x720",
            description = "Size in pixels (default: ${DEFAULT-VALUE}).")
    private String size;

    @Option(
            names = "--length",
            paramLabel = "S",
            description = "Length in seconds (default: 10, or what --slower needs).")
    private Double length;

    @Option(
            names = "--rate",
            paramLabel = "N",
            defaultValue = "25",
            description = "Frames a second, 1 … 60; a GIF takes at most 50 (default: ${DEFAULT-VALUE}).")
    private double rate;

    @Option(
            names = "--slower",
            paramLabel = "X",
            description = "How many times slower than the gas (default: a round number that fits the length).")
    private Double slower;

    @Option(
            names = "--exaggeration",
            paramLabel = "X",
            defaultValue = "1000",
            description = "Factor on the film thickness in the gap view (default: ${DEFAULT-VALUE}).")
    private double exaggeration = GapSettings.USUAL;

    @Option(
            names = "--background",
            paramLabel = "SHADE",
            defaultValue = "light",
            description = "light or dark (default: ${DEFAULT-VALUE}).")
    private PictureSettings.Background background;

    @Mixin
    private TracingOptions tracing;

    @Mixin
    private Talk talk;

    @Override
    public Integer call() throws IOException {
        MotionSettings settings = settings();
        boolean asked = as != null;
        Set<MotionFiles.As> files = asked ? as : EnumSet.of(MotionFiles.As.GIF, MotionFiles.As.MP4);
        if (files.contains(MotionFiles.As.GIF) && rate > GifFile.MOST_RATE) {
            throw wrong("--rate is " + rate + "; a GIF takes at most " + (int) GifFile.MOST_RATE
                    + " frames a second; choose fewer, or --as mp4");
        }
        if (tracers != null && (tracers < 0 || tracers > MOST_TRACERS)) {
            throw wrong("--tracers is " + tracers + "; expected a whole number from 0 to " + MOST_TRACERS);
        }
        double[] start = start();
        if (files.equals(EnumSet.of(MotionFiles.As.MP4)) && !VideoFile.possible()) {
            talk.warn(VideoFile.MISSING);
            return ExitStatus.SHORT_OF_WANTED;
        }
        FieldInput input = FieldInput.read(field, talk);
        settings = settings.in(titled(settings.picture(), input.title()));
        Path target = folder.or(input.defaultFolder());
        WholeFolder.check(target);
        FilmFlow flow = input.flow();
        List<String> written = new ArrayList<>();
        List<String> missing = new ArrayList<>();
        ObjectNode json = JsonNodeFactory.instance.objectNode();
        json.put("result", "animation").put("version", 1);
        MotionSettings how = settings;
        try {
            WholeFolder.add(target, into -> {
                for (Kind kind : kinds) {
                    String name = kind.name().toLowerCase(Locale.ROOT);
                    try (Animation animation = animation(kind, flow, start, how);
                            Talk.Stretch stretch = talk.begin("Drawing " + animation.frames() + " frames")) {
                        MotionFiles.Written done =
                                MotionFiles.write(animation, into, name, input.title(), files, stretch);
                        written.addAll(done.files());
                        done.missing().stream()
                                .filter(s -> !missing.contains(s))
                                .forEach(missing::add);
                        ObjectNode node = json.withObject("/" + name);
                        node.put("frames", animation.frames()).put("rate", animation.rate());
                        node.put("width", animation.width()).put("height", animation.height());
                        node.put("shows", animation.words());
                    }
                }
            });
        } catch (NoOpenGL e) {
            talk.warn(e.getMessage());
            return ExitStatus.SHORT_OF_WANTED;
        }
        missing.forEach(talk::warn);
        if (talk.json()) {
            written.forEach(json.withArray("/files")::add);
            json.put("caution", Cautions.TEXT);
            talk.out().print(ResultJson.text(json));
            talk.out().flush();
        }
        for (String name : written) {
            talk.say("Written: " + target.resolve(name));
        }
        boolean onlyUnasked = !asked && missing.stream().allMatch(VideoFile.MISSING::equals);
        return missing.isEmpty() || onlyUnasked ? ExitStatus.DONE : ExitStatus.SHORT_OF_WANTED;
    }

    private Animation animation(Kind kind, FilmFlow flow, double[] start, MotionSettings settings) {
        TraceSettings how = Pictures.settings(flow, tracing.frame(), tracing.tolerance());
        try {
            return switch (kind) {
                case RIDE ->
                    start == null
                            ? ride(flow, tracing, or(RIDE_TRACERS), settings)
                            : rideFrom(flow, start, how, settings);
                case TURN -> Turn.of(flow, tubes(flow, how, or(12)), settings);
                case RELEASE -> {
                    PathEnd.Border border = entry(flow);
                    yield LetGo.of(flow, recorded(flow, how, border, tracing.seed(), or(600)), since(border), settings);
                }
            };
        } catch (IllegalArgumentException e) {
            throw wrong(e.getMessage());
        }
    }

    private int or(int usual) {
        return tracers == null ? usual : tracers;
    }

    /**
     * The ride behind gas from where most enters that goes the way most of it goes.
     *
     * @param count how many other tracers are shown
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where there is no gas to follow, or the size is beyond the memory
     */
    static Animation ride(FilmFlow flow, TracingOptions tracing, int count, MotionSettings settings) {
        TraceSettings how = Pictures.settings(flow, tracing.frame(), tracing.tolerance());
        PathEnd.Border border = entry(flow);
        List<org.whither.trace.Path> candidates = recorded(flow, how, border, tracing.seed(), CANDIDATES);
        candidates.removeIf(path -> path.points().size() < 2);
        if (candidates.isEmpty()) {
            throw new IllegalArgumentException("no gas enters this film that could be followed; command ride starts"
                    + " anywhere in the film with --from");
        }
        return Ride.of(
                flow,
                PathChoice.choose(candidates, 1).get(0),
                since(border),
                recorded(flow, how, border, tracing.seed(), count),
                settings);
    }

    private Animation rideFrom(FilmFlow flow, double[] start, TraceSettings how, MotionSettings settings) {
        checkStart(flow.film().grid(), start);
        org.whither.trace.Path followed = new Tracer(flow, how).record(new Release(start[0], start[1], start[2], 0));
        if (followed.points().size() < 2 || followed.end().time() < Ride.LEAST_SECONDS) {
            throw new IllegalArgumentException(
                    "--from is " + from + ", where gas leaves the film at once; start it" + " further inside the film");
        }
        PathEnd.Border border = entry(flow);
        List<org.whither.trace.Path> others = recorded(flow, how, border, tracing.seed(), or(RIDE_TRACERS));
        return Ride.of(flow, followed, "since it was let go", others, settings);
    }

    /** Paths that differ from one another and run less than most of the way round: others would hide the ring. */
    private List<org.whither.trace.Path> tubes(FilmFlow flow, TraceSettings how, int count) {
        List<org.whither.trace.Path> all =
                recorded(flow, how, entry(flow), tracing.seed(), Math.min(MOST_TRACERS, 8 * count));
        List<org.whither.trace.Path> few = new ArrayList<>(all);
        few.removeIf(path -> path.points().isEmpty()
                || Math.abs(path.points().get(path.points().size() - 1).steadyTheta()
                                - path.points().get(0).steadyTheta())
                        > MOST_OF_THE_WAY);
        return PathChoice.choose(few.size() >= count ? few : all, count);
    }

    private static String since(PathEnd.Border border) {
        return switch (border) {
            case SUPPLY -> "since the gas entered by the feed";
            case INNER -> "since the gas entered at the inner diameter";
            case OUTER -> "since the gas entered at the outer diameter";
        };
    }

    /** The border at which most gas enters. */
    private static PathEnd.Border entry(FilmFlow flow) {
        BorderBalance balance = BorderBalance.of(flow);
        if (balance.supplyIn() > 0) {
            return PathEnd.Border.SUPPLY;
        }
        return balance.innerIn() > balance.outerIn() ? PathEnd.Border.INNER : PathEnd.Border.OUTER;
    }

    private static List<org.whither.trace.Path> recorded(
            FilmFlow flow, TraceSettings how, PathEnd.Border border, long seed, int count) {
        Tracer tracer = new Tracer(flow, how);
        List<org.whither.trace.Path> paths = new ArrayList<>();
        for (Release release : ReleasePlan.entering(flow, border).releases(seed, 0, Math.max(1, count))) {
            paths.add(tracer.record(release));
        }
        return count == 0 ? new ArrayList<>() : paths;
    }

    private double[] start() {
        if (from == null) {
            return null;
        }
        String[] parts = from.split(",", -1);
        double[] values = new double[3];
        try {
            for (int n = 0; n < 3; n++) {
                values[n] = Double.parseDouble(parts[n].strip());
            }
        } catch (NumberFormatException | ArrayIndexOutOfBoundsException e) {
            values[0] = Double.NaN;
        }
        if (parts.length != 3 || !Double.isFinite(values[0] + values[1] + values[2])) {
            throw wrong("--from is \"" + from + "\"; expected three numbers, angle in rad, radius in m and height as a"
                    + " share of the film thickness, such as 0.2,0.06,0.5");
        }
        return values;
    }

    private void checkStart(FilmGrid grid, double[] start) {
        if (!(start[1] >= grid.innerRadius() && start[1] <= grid.outerRadius())) {
            throw new IllegalArgumentException(String.format(
                    Locale.ROOT,
                    "--from is %s, outside the film: the radius is %s m; expected %s … %s m",
                    from,
                    start[1],
                    grid.innerRadius(),
                    grid.outerRadius()));
        }
        if (!(start[2] >= 0 && start[2] <= 1) || Math.abs(start[0]) > 1e6) {
            throw new IllegalArgumentException(
                    "--from is " + from + ", outside the film: expected a height from 0 (at the"
                            + " rotor) to 1 (at the stator) and an angle within 1e6 rad");
        }
    }

    private MotionSettings settings() {
        Matcher matcher = SIZE.matcher(size);
        if (!matcher.matches()) {
            throw wrong("--size is \"" + size + "\"; expected two whole numbers such as 1280x720");
        }
        try {
            PictureSettings picture = PictureSettings.standard("")
                    .sized(Integer.parseInt(matcher.group(1)), Integer.parseInt(matcher.group(2)))
                    .on(background)
                    .speedsIn(tracing.frame());
            return new MotionSettings(
                    picture,
                    view,
                    exaggeration,
                    optional(length, 1),
                    rate,
                    optional(slower, 1),
                    optional(behind, 1e-3));
        } catch (IllegalArgumentException e) {
            throw wrong(e.getMessage());
        }
    }

    private static OptionalDouble optional(Double value, double factor) {
        return value == null ? OptionalDouble.empty() : OptionalDouble.of(factor * value);
    }

    static PictureSettings titled(PictureSettings plain, String title) {
        return new PictureSettings(
                plain.width(),
                plain.height(),
                title,
                plain.background(),
                plain.seenFrom(),
                plain.speedFrame(),
                plain.pressureRange(),
                plain.speedRange());
    }

    private ParameterException wrong(String sentence) {
        return new ParameterException(spec.commandLine(), sentence);
    }
}
