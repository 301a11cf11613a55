package org.whither.eddy;

import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.function.DoubleConsumer;
import org.apache.commons.math3.stat.interval.WilsonScoreInterval;
import org.whither.fate.BorderBalance;
import org.whither.fate.FilmMass;
import org.whither.film.FilmFlow;
import org.whither.trace.Release;

/** Looks for recirculation, step by step. */
final class EddySearch {
    /** Part of the budget for the first tracers, one for each equal mass of film. */
    private static final double FIRST = 0.25;

    private final FilmFlow flow;
    private final EddySettings settings;
    private final DoubleConsumer progress;

    EddySearch(FilmFlow flow, EddySettings settings, DoubleConsumer progress) {
        this.flow = flow;
        this.settings = settings;
        this.progress = progress;
    }

    Eddies find() {
        HoldTest test = new HoldTest(flow, settings, BorderBalance.of(flow));
        progress.accept(0.05);
        if (!(test.medianResidence() < Double.POSITIVE_INFINITY)) {
            throw new NoThroughFlow("most of the gas that enters does not leave the film");
        }
        int count = Integer.highestOneBit((int) (FIRST * settings.budget()));
        List<Release> releases = new InteriorPlan(flow).releases(settings.seed(), 0, count);
        HoldTest.Stay[] stays = test.test(releases);
        int older = test.older();
        List<Release> held = new ArrayList<>();
        int creeping = 0;
        for (int n = 0; n < count; n++) {
            if (stays[n] == HoldTest.Stay.HELD) {
                held.add(releases.get(n));
            }
            creeping += stays[n] == HoldTest.Stay.CREEPING ? 1 : 0;
        }
        progress.accept(0.35);
        double filmMass = FilmMass.of(flow);
        ZoneSearch search =
                new ZoneSearch(flow, settings, test, filmMass, part -> progress.accept(0.35 + 0.5 * Math.min(1, part)));
        search.find(held, count);
        progress.accept(0.85);
        LongStayers longStayers = StayMap.longest(flow, settings, test, Eddies.LONGEST_SHARE);
        progress.accept(0.95);
        StillPoints still = new StillPoints(flow);
        still.find();
        List<String> notes = new ArrayList<>();
        if (test.failure() != null) {
            notes.add(String.format(
                    Locale.ROOT,
                    "A tracer could not be followed beyond r = %.4f mm, θ = %.5f rad, σ = %.4f: %s.",
                    1000 * test.failure().position().radius(),
                    test.failure().position().theta(),
                    test.failure().position().sigma(),
                    test.failure().reason()));
        }
        var wilson = new WilsonScoreInterval().createInterval(count, held.size(), 0.95);
        boolean known = search.settled() && !search.zones().isEmpty();
        double zones = search.zones().stream().mapToDouble(Zone::massShare).sum();
        double scattered =
                search.small().stream().mapToDouble(SmallCluster::mass).sum()
                        * flow.film().grid().sectors()
                        / filmMass;
        double low = search.zones().stream()
                .mapToDouble(zone -> zone.massShare() * zone.massLow() / zone.mass())
                .sum();
        double high = search.zones().stream()
                .mapToDouble(zone -> zone.massShare() * zone.massHigh() / zone.mass())
                .sum();
        double smallest = 1 - Math.pow(0.05, 1.0 / count);
        return new Eddies(
                settings,
                test.medianResidence(),
                filmMass,
                known ? zones + scattered : (double) held.size() / count,
                known ? low : Math.max(0, wilson.getLowerBound()),
                known ? high + scattered + smallest : wilson.getUpperBound(),
                test.unflushed(),
                (double) older / count,
                (double) creeping / count,
                smallest,
                ReversedFlow.of(flow),
                search.zones(),
                search.small(),
                still.points(),
                still.separatrices(),
                longStayers,
                search.settled(),
                test.tracers(),
                test.steps(),
                notes);
    }
}
