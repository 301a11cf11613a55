package org.whither.io.report;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Arrays;
import java.util.EnumMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.whither.fate.Destination;
import org.whither.fate.FedPoint;
import org.whither.fate.Split;

/**
 * How long supply gas stays in the film, as a histogram for each of its destinations: the residence-time distribution of
 * P. V. Danckwerts, Chem. Eng. Sci. 2 (1953) 1–13, in equal steps of time.
 */
final class ResidenceDistribution {
    private static final int BINS = 48;
    /** The part of the gas that the histogram shows; the last of it stays far longer than the rest. */
    private static final double SHOWN = 0.95;

    private static final int LEAST = 50;

    private final double step;
    private final int tracers;
    private final Map<Destination, double[]> shares = new EnumMap<>(Destination.class);
    private final Map<Destination, Double> beyond = new EnumMap<>(Destination.class);

    private ResidenceDistribution(double step, int tracers) {
        this.step = step;
        this.tracers = tracers;
    }

    /** The distribution of a split's supply gas; none where too few of its tracers left the film. */
    static Optional<ResidenceDistribution> of(Split split) {
        List<FedPoint> left = split.fed().stream()
                .filter(point -> Destination.of(point.end()) != Destination.HELD
                        && Destination.of(point.end()) != Destination.LOST)
                .toList();
        if (left.size() < LEAST) {
            return Optional.empty();
        }
        double[] times =
                left.stream().mapToDouble(point -> point.end().time()).sorted().toArray();
        double end = round(times[(int) (SHOWN * (times.length - 1))]);
        if (!(end > 0)) {
            return Optional.empty();
        }
        ResidenceDistribution found =
                new ResidenceDistribution(end / BINS, split.fed().size());
        double each = 1.0 / split.fed().size();
        for (FedPoint point : left) {
            Destination to = Destination.of(point.end());
            int bin = (int) (point.end().time() / found.step);
            double[] bins = found.shares.computeIfAbsent(to, key -> new double[BINS]);
            if (bin < BINS) {
                bins[bin] += each;
            } else {
                found.beyond.merge(to, each, Double::sum);
            }
        }
        return Optional.of(found);
    }

    /** Up to the next of 1, 1.2, 1.6, 2, 2.4, 3.2, 4, 4.8, 6, 8 times a power of ten, which 48 steps divide well. */
    static double round(double value) {
        if (!(value > 0)) {
            return 0;
        }
        double ten = Math.pow(10, Math.floor(Math.log10(value)));
        for (double nice : new double[] {1, 1.2, 1.6, 2, 2.4, 3.2, 4, 4.8, 6, 8}) {
            if (value <= nice * ten * (1 + 1e-12)) {
                return nice * ten;
            }
        }
        return 10 * ten;
    }

    /** Its steps in seconds and the share of all supply gas in each. */
    ObjectNode json() {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("step", step);
        node.put("tracers", tracers);
        ArrayNode to = node.putArray("to");
        for (Map.Entry<Destination, double[]> entry : shares.entrySet()) {
            ObjectNode each = to.addObject();
            each.put("to", entry.getKey().name().toLowerCase(Locale.ROOT));
            Arrays.stream(entry.getValue()).forEach(each.putArray("share")::add);
            each.put("beyond", beyond.getOrDefault(entry.getKey(), 0.0));
        }
        return node;
    }
}
