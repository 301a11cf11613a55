package org.whither.eddy;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.DoubleConsumer;
import org.apache.commons.math3.stat.interval.WilsonScoreInterval;
import org.whither.fate.BorderBalance;
import org.whither.fate.FilmMass;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Release;

/** Looks for recirculation, step by step. */
final class EddySearch {
    /** Tracers of a cluster, below which it is no zone. */
    private static final int LEAST = 8;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final EddySettings settings;
    private final DoubleConsumer progress;

    EddySearch(FilmFlow flow, EddySettings settings, DoubleConsumer progress) {
        this.flow = flow;
        this.grid = flow.film().grid();
        this.settings = settings;
        this.progress = progress;
    }

    Eddies find() {
        BorderBalance balance = BorderBalance.of(flow);
        HoldTest test = new HoldTest(flow, settings, balance);
        progress.accept(0.1);
        InteriorPlan plan = new InteriorPlan(flow);
        int count = settings.budget() / 2;
        List<Release> releases = plan.releases(settings.seed(), 0, count);
        HoldTest.Stay[] stays = test.test(releases);
        List<Release> held = new ArrayList<>();
        int creeping = 0;
        for (int n = 0; n < count; n++) {
            if (stays[n] == HoldTest.Stay.HELD) {
                held.add(releases.get(n));
            }
            creeping += stays[n] == HoldTest.Stay.CREEPING ? 1 : 0;
        }
        progress.accept(0.6);
        double filmMass = FilmMass.of(flow);
        List<Zone> zones = new ArrayList<>();
        List<SmallCluster> small = new ArrayList<>();
        Optional<Dam> dam = Dam.of(flow);
        double reach = 2 / Math.cbrt(count);
        double[][] points = new double[held.size()][];
        Spot spot = new Spot(flow);
        for (int n = 0; n < points.length; n++) {
            Release at = held.get(n);
            spot.go(at.theta(), at.radius(), at.sigma());
            points[n] = new double[] {
                spot.phase(), (at.radius() - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius()), at.sigma()
            };
        }
        for (Clusters.Cluster cluster : Clusters.of(points, new double[] {reach, reach, reach})) {
            double mass = cluster.members().length * plan.mass() / count;
            List<Place> places = new ArrayList<>();
            double[] sum = new double[5];
            double[] low = {Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY};
            double[] high = {Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY};
            for (int n = 0; n < cluster.members().length; n++) {
                Release at = held.get(cluster.members()[n]);
                double theta =
                        grid.lineTheta(0, grid.row(at.radius()), at.radius()) + cluster.first()[n] * grid.pitch();
                places.add(new Place(theta, at.radius(), at.sigma()));
                double[] where = {theta, at.radius(), at.sigma()};
                spot.go(theta, at.radius(), at.sigma());
                for (int c = 0; c < 3; c++) {
                    sum[c] += where[c];
                    low[c] = Math.min(low[c], where[c]);
                    high[c] = Math.max(high[c], where[c]);
                }
                sum[3] += spot.pressure();
                sum[4] += 1 / spot.density();
            }
            int members = places.size();
            Place centre = new Place(sum[0] / members, sum[1] / members, sum[2] / members);
            if (members < LEAST) {
                small.add(new SmallCluster(centre, members, mass));
                continue;
            }
            int alike = cluster.wraps() ? 1 : grid.sectors();
            double one = cluster.wraps() ? mass * grid.sectors() : mass;
            zones.add(new Zone(
                    centre,
                    cluster.wraps() ? new Range(0, 2 * Math.PI) : new Range(low[0], high[0]),
                    new Range(low[1], high[1]),
                    new Range(low[2], high[2]),
                    one * sum[4] / members,
                    one,
                    one,
                    one,
                    one * alike / filmMass,
                    alike,
                    Sense.NONE,
                    OptionalDouble.empty(),
                    sum[3] / members,
                    dam.map(d -> d.distance(centre.radius())),
                    new Exchange(0, 0, 0, 0, 0, 0),
                    places,
                    false,
                    members));
        }
        var wilson = new WilsonScoreInterval().createInterval(count, held.size(), 0.95);
        LongStayers longStayers = StayMap.longest(flow, settings, test, Eddies.LONGEST_SHARE);
        progress.accept(1);
        return new Eddies(
                settings,
                test.medianResidence(),
                filmMass,
                (double) held.size() / count,
                wilson.getLowerBound(),
                wilson.getUpperBound(),
                (double) creeping / count,
                1 - Math.pow(0.05, 1.0 / count),
                ReversedFlow.of(flow),
                zones,
                small,
                List.of(),
                List.of(),
                longStayers,
                zones.isEmpty(),
                test.tracers(),
                test.steps(),
                List.of());
    }
}
