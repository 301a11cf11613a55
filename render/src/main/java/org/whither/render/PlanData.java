package org.whither.render;

import java.util.List;
import java.util.Optional;
import org.whither.eddy.AgeMap;
import org.whither.eddy.Zone;
import org.whither.fate.DestinationMap;
import org.whither.fate.FedPoint;
import org.whither.trace.Path;

/**
 * What was computed of a film that a plan can show.
 *
 * @param fed points of the feed with the ends of their tracers; may be empty
 * @param paths paths whose footprints are drawn; may be empty
 * @param ages age of the gas; needed to show it
 * @param destinations where the gas at mid film goes; needed to show it
 * @param zones zones of held gas that are outlined; may be empty
 */
public record PlanData(
        List<FedPoint> fed,
        List<Path> paths,
        Optional<AgeMap> ages,
        Optional<DestinationMap> destinations,
        List<Zone> zones) {
    /** Keeps its own copies. */
    public PlanData {
        fed = List.copyOf(fed);
        paths = List.copyOf(paths);
        zones = List.copyOf(zones);
    }

    /** Without zones. */
    public PlanData(
            List<FedPoint> fed, List<Path> paths, Optional<AgeMap> ages, Optional<DestinationMap> destinations) {
        this(fed, paths, ages, destinations, List.of());
    }

    /** Nothing but points of the feed and paths. */
    public static PlanData of(List<FedPoint> fed, List<Path> paths) {
        return new PlanData(fed, paths, Optional.empty(), Optional.empty());
    }
}
