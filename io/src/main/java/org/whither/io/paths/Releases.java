package org.whither.io.paths;

import java.util.ArrayList;
import java.util.List;
import org.whither.fate.ReleasePlan;
import org.whither.trace.Release;

/** Where tracers are released, in order; those over a border are made when they are asked for. */
public final class Releases {
    private final List<List<Release>> fixed = new ArrayList<>();
    private final List<Spread> spreads = new ArrayList<>();
    private final List<Integer> starts = new ArrayList<>();
    private int count;

    /** Tracers over a border, each for the same flow, from a sequence of which any stretch can be had. */
    private record Spread(ReleasePlan plan, long seed, int count) {
        List<Release> slice(int from, int to) {
            double each = plan.massFlow() / count;
            List<Release> slice = new ArrayList<>(to - from);
            for (Release release : plan.releases(seed, from, to - from)) {
                slice.add(new Release(release.theta(), release.radius(), release.sigma(), each));
            }
            return slice;
        }
    }

    /** Adds releases one by one. */
    public void add(List<Release> releases) {
        add(releases, null, releases.size());
    }

    /**
     * Adds releases spread over a border, each for the same mass flow.
     *
     * @param plan the border; gas crosses it
     * @param seed seed of the spread
     * @param number how many
     */
    public void add(ReleasePlan plan, long seed, int number) {
        add(null, new Spread(plan, seed, number), number);
    }

    private void add(List<Release> list, Spread spread, int number) {
        starts.add(count);
        fixed.add(list);
        spreads.add(spread);
        count = Math.addExact(count, number);
    }

    /** How many in all. */
    public int count() {
        return count;
    }

    /** A stretch of them; may be asked for from many threads. */
    public List<Release> slice(int from, int to) {
        List<Release> slice = new ArrayList<>(to - from);
        for (int part = 0; part < starts.size(); part++) {
            int start = starts.get(part);
            int end = part + 1 < starts.size() ? starts.get(part + 1) : count;
            int a = Math.max(from, start) - start;
            int b = Math.min(to, end) - start;
            if (a < b) {
                List<Release> list = fixed.get(part);
                slice.addAll(list == null ? spreads.get(part).slice(a, b) : list.subList(a, b));
            }
        }
        return slice;
    }
}
