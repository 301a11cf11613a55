package org.whither.bench;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import org.whither.film.FilmFlow;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * Error over work: how far the ends of tracers are off at a tolerance, against the same tracers at 1e-12, and how often the
 * motion of the gas was asked for. The library beside it integrates over the borders of the cells, where the motion is not
 * smooth.
 */
final class Precision {
    private static final int TRACERS = 2000;
    private static final int FEWER = 200;
    private static final double[] TOLERANCES = {1e-2, 1e-3, 1e-4, 1e-5, 1e-6, 1e-7, 1e-8};
    private static final double[] FEWER_TOLERANCES = {1e-4, 1e-6, 1e-8};
    /** Seven a step: at the border of a cell the last rates of a step do not serve the next. */
    private static final int EVALUATIONS = 7;

    private Precision() {}

    static List<String> table() {
        FilmFlow flow = FilmFlow.of(FullFilms.full(241, 161, 25));
        List<Release> releases = Work.releases(flow, TRACERS);
        List<PathEnd> exact = follow(flow, 1e-12, releases).ends();
        List<String> table = new ArrayList<>();
        table.add("tolerance            evaluations   rejected  other exits   error of the time, 50 and 90 %");
        for (double tolerance : TOLERANCES) {
            ParallelTracing.Outcome outcome = follow(flow, tolerance, releases);
            long tried = outcome.steps() + outcome.rejectedSteps();
            double[] times = new double[TRACERS];
            for (int n = 0; n < TRACERS; n++) {
                PathEnd a = exact.get(n);
                PathEnd b = outcome.ends().get(n);
                boolean same = a instanceof PathEnd.Left left
                        && b instanceof PathEnd.Left other
                        && left.border() == other.border();
                times[n] = same ? b.time() : a instanceof PathEnd.Left || b instanceof PathEnd.Left ? -1 : Double.NaN;
            }
            double rejected = 100.0 * outcome.rejectedSteps() / tried;
            table.add(row("whither", tolerance, EVALUATIONS * tried / TRACERS, rejected, exact, times));
        }
        List<Release> few = releases.subList(0, FEWER);
        for (double tolerance : FEWER_TOLERANCES) {
            TraceSettings settings = Work.settings(flow.film(), tolerance);
            LocatedFlow located = new LocatedFlow(flow);
            double[] times = LibraryTracing.commonsMath(located, flow, settings, few);
            for (int n = 0; n < FEWER; n++) {
                if (times[n] >= settings.timeLimit() * (1 - 1e-9)) {
                    times[n] = exact.get(n) instanceof PathEnd.Left ? -1 : Double.NaN;
                }
            }
            long evaluations = located.evaluations() / FEWER;
            table.add(row("Commons Math", tolerance, evaluations, Double.NaN, exact, times));
        }
        return table;
    }

    private static ParallelTracing.Outcome follow(FilmFlow flow, double tolerance, List<Release> releases) {
        return ParallelTracing.follow(flow, Work.settings(flow.film(), tolerance), releases, 2, done -> {});
    }

    /** Times are −1 for another exit than the exact one, and not a number where there is none. */
    private static String row(
            String name, double tolerance, long evaluations, double rejected, List<PathEnd> exact, double[] times) {
        double[] errors = new double[times.length];
        int left = 0;
        int others = 0;
        for (int n = 0; n < times.length; n++) {
            if (times[n] < 0) {
                others++;
            } else if (!Double.isNaN(times[n]) && exact.get(n) instanceof PathEnd.Left end) {
                errors[left++] = Math.abs(times[n] - end.time()) / end.time();
            }
        }
        double[] sorted = Arrays.copyOf(errors, left);
        Arrays.sort(sorted);
        return String.format(
                Locale.ROOT,
                "%-12s %.0e  %10d   %6.2f %%   %4d of %4d   %.1e  %.1e",
                name,
                tolerance,
                evaluations,
                rejected,
                others,
                times.length,
                left == 0 ? Double.NaN : sorted[left / 2],
                left == 0 ? Double.NaN : sorted[left * 9 / 10]);
    }
}
