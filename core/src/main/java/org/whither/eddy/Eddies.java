package org.whither.eddy;

import java.util.List;
import java.util.function.DoubleConsumer;
import org.whither.fate.BorderBalance;
import org.whither.film.FilmFlow;

/**
 * The recirculation in a film.
 *
 * @param settings how it was looked for
 * @param medianResidence median residence of the through-going gas (s)
 * @param filmMass mass of the gas in the film (kg)
 * @param heldMassShare share of the film's gas that is held
 * @param heldLow lower end of its 95 % interval
 * @param heldHigh upper end
 * @param heldByResidence share of gas that came in longer ago than gas counts as held, or never, told by the residences of
 *     what enters, without the tracers inside the film
 * @param olderMassShare the same share by the tracers inside; both estimate one number
 * @param creepingMassShare share that stays as long by the plain clock, but only because it lies close to a face
 * @param smallestSeen share of the film's gas above which a zone, or a set of equal zones, would have been met with a
 *     chance of 95 %
 * @param reversed reversed flow
 * @param zones zones of held gas, the heaviest first
 * @param small held gas that is too little to be told as a zone
 * @param points where the flow stands still
 * @param separatrices lines that part paths of different fate
 * @param longStayers the through-going gas that stays longest
 * @param settled whether the mass of every zone is known to 5 %
 * @param tracers tracers released inside the film
 * @param steps integration steps kept
 * @param notes what a user must know of it, a sentence each
 */
public record Eddies(
        EddySettings settings,
        double medianResidence,
        double filmMass,
        double heldMassShare,
        double heldLow,
        double heldHigh,
        Unflushed heldByResidence,
        double olderMassShare,
        double creepingMassShare,
        double smallestSeen,
        ReversedFlow reversed,
        List<Zone> zones,
        List<SmallCluster> small,
        List<CriticalPoint> points,
        List<Separatrix> separatrices,
        LongStayers longStayers,
        boolean settled,
        long tracers,
        long steps,
        List<String> notes) {

    /** Share of the through-going gas that the long stayers are. */
    public static final double LONGEST_SHARE = 0.01;

    /** Keeps its own copies. */
    public Eddies {
        zones = List.copyOf(zones);
        small = List.copyOf(small);
        points = List.copyOf(points);
        separatrices = List.copyOf(separatrices);
        notes = List.copyOf(notes);
    }

    /**
     * Looks for recirculation.
     *
     * @param flow the motion of the gas
     * @param settings how
     * @param progress told the part done, 0 … 1, from any thread
     * @return what was found
     * @throws NoThroughFlow where no gas goes through the film
     */
    public static Eddies of(FilmFlow flow, EddySettings settings, DoubleConsumer progress) {
        BorderBalance balance = BorderBalance.of(flow);
        if (!(balance.inflow() > 0)) {
            throw new NoThroughFlow("no gas enters the film over any border");
        }
        if (!(balance.outflow() > 0)) {
            throw new NoThroughFlow("gas enters the film but leaves it over no border");
        }
        return new EddySearch(flow, settings, progress).find();
    }

    /** Time after which gas counts as held (s). */
    public double heldAfter() {
        return settings.patience() * medianResidence;
    }
}
