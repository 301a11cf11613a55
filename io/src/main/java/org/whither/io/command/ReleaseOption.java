package org.whither.io.command;

import java.io.IOException;
import java.nio.file.InvalidPathException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.whither.fate.ReleasePlan;
import org.whither.film.FilmFlow;
import org.whither.io.paths.ReleaseFile;
import org.whither.io.paths.Releases;
import org.whither.trace.Course;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** Where tracers are released. */
final class ReleaseOption {
    static final int MOST = 10_000_000;

    private static final String STANDARD = "feed:100";
    private static final Pattern GRID = Pattern.compile("(supply|inner|outer),(\\d{1,6})[x×](\\d{1,6})");
    private static final String EXPECTED =
            "expected feed:N, at:THETA,RADIUS,SIGMA, grid:supply|inner|outer,NxM or file:NAME";

    @Spec(Spec.Target.MIXEE)
    private CommandSpec spec;

    @Option(
            names = "--release",
            paramLabel = "WHERE",
            description = {
                "Where tracers start; may be given several times (default: " + STANDARD + ").",
                "feed:N: N over the feed of one sector, each for the same part of the whole ring's mass flow.",
                "at:THETA,RADIUS,SIGMA: one point; rad, m, and the height as a fraction of the film thickness, 0 at the"
                        + " rotor face. THETA is the angle of the field's own grid.",
                "grid:BORDER,NxM: N round a sector by M across supply, inner or outer, where gas enters there (followed"
                        + " backward: leaves there), spaced so that each stands for the same mass flow.",
                "file:NAME: points from a CSV file with the columns theta_rad, radius_m, sigma, or from a JSON array of"
                        + " {theta, radius, sigma}."
            })
    private List<String> wanted = new ArrayList<>();

    /** The releases as they were asked for. */
    List<String> words() {
        return wanted.isEmpty() ? List.of(STANDARD) : List.copyOf(wanted);
    }

    private ParameterException wrong(String text, String fault) {
        return new ParameterException(spec.commandLine(), "--release " + text + ": " + fault);
    }

    /** Refuses what can be seen to be wrong without the field. */
    void check(Course course) {
        long count = 0;
        for (String text : words()) {
            int colon = text.indexOf(':');
            String kind = colon < 0 ? text : text.substring(0, colon).toLowerCase(Locale.ROOT);
            String rest = colon < 0 ? "" : text.substring(colon + 1).strip();
            switch (kind) {
                case "feed" -> {
                    count += number(text, rest);
                    if (course == Course.BACKWARD) {
                        throw wrong(
                                text,
                                "followed backward, gas in the feed has come from nowhere else; expected forward or both,"
                                        + " or grid:inner,NxM or grid:outer,NxM to follow back what leaves");
                    }
                }
                case "at" -> point(text, rest);
                case "grid" -> {
                    Matcher matcher = grid(text, rest);
                    count += (long) number(text, matcher.group(2)) * number(text, matcher.group(3));
                }
                case "file" -> path(text, rest);
                default -> throw wrong(text, "it is not known; " + EXPECTED);
            }
            if (count > MOST) {
                throw wrong(text, "that makes " + count + " tracers; expected at most " + MOST);
            }
        }
    }

    private int number(String text, String digits) {
        if (!digits.matches("0*[1-9]\\d{0,8}")) {
            throw wrong(text, "\"" + digits + "\" is no number of tracers; expected a whole number from 1 to " + MOST);
        }
        return Integer.parseInt(digits);
    }

    private double[] point(String text, String rest) {
        String[] parts = rest.split(",", -1);
        if (parts.length != 3) {
            throw wrong(text, "it has " + parts.length + " values; expected three, THETA,RADIUS,SIGMA");
        }
        double[] point = new double[3];
        for (int n = 0; n < 3; n++) {
            try {
                point[n] = Double.parseDouble(parts[n].strip());
            } catch (NumberFormatException e) {
                throw wrong(text, "\"" + parts[n] + "\" is not a number; expected one such as 0.0585");
            }
        }
        return point;
    }

    private Matcher grid(String text, String rest) {
        Matcher matcher = GRID.matcher(rest.toLowerCase(Locale.ROOT).replace(" ", ""));
        if (!matcher.matches()) {
            throw wrong(text, "it is not understood; expected grid:BORDER,NxM such as grid:outer,24x5");
        }
        return matcher;
    }

    private Path path(String text, String rest) {
        try {
            if (!rest.isEmpty()) {
                return Path.of(rest);
            }
        } catch (InvalidPathException e) {
            throw wrong(text, "that is no name of a file: " + e.getReason());
        }
        throw wrong(text, "the name of the file is missing; expected file:NAME");
    }

    /** The releases in a film; refuses those outside it. */
    Releases in(FilmFlow flow, Course course, long seed) throws IOException {
        Releases releases = new Releases();
        for (String text : words()) {
            int colon = text.indexOf(':');
            String kind = text.substring(0, colon).toLowerCase(Locale.ROOT);
            String rest = text.substring(colon + 1).strip();
            switch (kind) {
                case "feed" ->
                    releases.add(plan(text, flow, PathEnd.Border.SUPPLY, Course.FORWARD), seed, number(text, rest));
                case "at" -> {
                    double[] point = point(text, rest);
                    String fault = ReleaseFile.fault(flow.film().grid(), point[0], point[1], point[2]);
                    if (fault != null) {
                        throw wrong(text, fault);
                    }
                    releases.add(List.of(new Release(point[0], point[1], point[2], 0)));
                }
                case "grid" -> releases.add(grid(text, grid(text, rest), flow, course));
                default ->
                    releases.add(ReleaseFile.read(path(text, rest), flow.film().grid()));
            }
        }
        if (releases.count() > MOST) {
            throw new ParameterException(
                    spec.commandLine(), releases.count() + " tracers are asked for; expected at most " + MOST);
        }
        return releases;
    }

    private ReleasePlan plan(String text, FilmFlow flow, PathEnd.Border border, Course course) {
        boolean entering = course != Course.BACKWARD;
        ReleasePlan plan = entering ? ReleasePlan.entering(flow, border) : ReleasePlan.leaving(flow, border);
        if (!(plan.massFlow() > 0)) {
            String place = border == PathEnd.Border.SUPPLY
                    ? "through the feed"
                    : "over the " + border.name().toLowerCase(Locale.ROOT) + " diameter";
            throw wrong(
                    text,
                    "in this field no gas " + (entering ? "enters " : "leaves ") + place
                            + "; expected a border where some does; give another border, or points with at:");
        }
        return plan;
    }

    private List<Release> grid(String text, Matcher matcher, FilmFlow flow, Course course) {
        PathEnd.Border border = PathEnd.Border.valueOf(matcher.group(1).toUpperCase(Locale.ROOT));
        int around = number(text, matcher.group(2));
        int across = number(text, matcher.group(3));
        ReleasePlan plan = plan(text, flow, border, course);
        double each = plan.massFlow() / around / across;
        List<Release> releases = new ArrayList<>();
        for (int u = 0; u < around; u++) {
            for (int v = 0; v < across; v++) {
                releases.add(plan.at((u + 0.5) / around, (v + 0.5) / across, each));
            }
        }
        return releases;
    }
}
