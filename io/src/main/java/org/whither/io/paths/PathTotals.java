package org.whither.io.paths;

import java.util.EnumMap;
import java.util.Map;
import org.whither.trace.PathEnd;

/** What became of all tracers together. */
public final class PathTotals {
    private final Map<Fate, Integer> from = new EnumMap<>(Fate.class);
    private final Map<Fate, Integer> fates = new EnumMap<>(Fate.class);
    private int tracers;
    private long points;
    private long steps;
    private String reason;

    void add(EndedPath path) {
        tracers++;
        points += path.path().size();
        if (path.from() != null) {
            from.merge(path.from(), 1, Integer::sum);
            note(path.path().before().orElseThrow());
        }
        if (path.fate() != null) {
            fates.merge(path.fate(), 1, Integer::sum);
            note(path.path().after().orElseThrow());
        }
    }

    private void note(PathEnd end) {
        if (reason == null && end instanceof PathEnd.Failed failed) {
            reason = failed.reason();
        }
    }

    void addSteps(long more) {
        steps += more;
    }

    /** Tracers followed. */
    public int tracers() {
        return tracers;
    }

    /** Points of their paths. */
    public long points() {
        return points;
    }

    /** Integration steps kept. */
    public long steps() {
        return steps;
    }

    /** How many came from where; empty where none was followed back. */
    public Map<Fate, Integer> from() {
        return from;
    }

    /** How many go where; empty where none was followed on. */
    public Map<Fate, Integer> fates() {
        return fates;
    }

    /** How many could not be integrated to an end, either way. */
    public int lost() {
        return from.getOrDefault(Fate.LOST, 0) + fates.getOrDefault(Fate.LOST, 0);
    }

    /** Why the first of them could not. */
    public String reason() {
        return reason;
    }
}
