package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.NodalFlow;
import org.whither.film.RadialCase;
import org.whither.trace.PathEnd.Border;

class SplitTest {
    private static final FilmGrid GRID = RadialCase.grid(6, RadialCase.radii(60, 48, 2e-4), 12, 0.3);

    private static SplitSettings settings(double width, int threads) {
        return new SplitSettings(Frame.ROTATING, 1e-6, width, 7, threads, SplitSettings.MOST_TRACERS);
    }

    /** The base case (see {@link RadialCase}): 0.571230 to the inner and 0.428770 to the outer diameter, and its times. */
    @Test
    void split_radialFilm_matchesExactShares() {
        for (boolean given : new boolean[] {true, false}) {
            FilmFlow flow = new ConservingFlow(RadialCase.film(GRID, given));
            Split split = Split.of(flow, settings(0.002, 2), x -> {});
            SplitRow inner = split.row(Border.SUPPLY, Destination.INNER).orElseThrow();
            SplitRow outer = split.row(Border.SUPPLY, Destination.OUTER).orElseThrow();
            assertEquals(0.571230, inner.share().share(), 0.001);
            assertEquals(0.428770, outer.share().share(), 0.001);
            assertTrue(inner.share().low() <= 0.57123 + 2e-4
                    && 0.57123 - 2e-4 <= inner.share().high());
            assertTrue(inner.share().width() <= 0.002);
            assertEquals(0, split.balance().closure(), 1e-9);
            assertEquals(0, split.balance().outerIn(), 0);
            assertEquals(0, split.lostShare(), 0);
            assertTrue(split.widthReached());
            assertEquals(2, split.table().size());
            // Danckwerts, Chem. Eng. Sci. 2 (1953): mean residence over all gas = film mass / mass flow. The tail of
            // slow
            // gas is heavy, and the feed row adds its own content.
            double mean =
                    inner.share().share() * inner.residenceTime().orElseThrow().mean()
                            + outer.share().share()
                                    * outer.residenceTime().orElseThrow().mean();
            assertEquals(split.filmMass() / split.balance().supplyIn(), mean, 0.03 * mean);
            assertEquals(
                    0.758105 * RadialCase.OUTER_TIME,
                    outer.residenceTime().get().p50(),
                    0.05 * RadialCase.OUTER_TIME);
        }
    }

    @Test
    void split_backward_agreesWithForward() {
        FilmFlow flow = new ConservingFlow(RadialCase.film(GRID, true));
        Split split = Split.of(flow, settings(0.004, 2), x -> {});
        assertEquals(2, split.backwardTable().size());
        for (SplitRow row : split.backwardTable()) {
            assertEquals(Border.SUPPLY, row.from().orElseThrow());
            SplitRow forward = split.row(Border.SUPPLY, row.to()).orElseThrow();
            assertEquals(forward.share().share(), row.share().share(), 0.004);
            assertEquals(
                    forward.massFlow(), row.massFlow(), 0.004 * split.balance().supplyIn());
            assertEquals(
                    forward.revolutions().orElseThrow().p50(),
                    row.revolutions().orElseThrow().p50(),
                    0.02);
        }
    }

    @Test
    void split_anyThreadsAndFrame_sameTable() {
        FilmFlow flow = new ConservingFlow(RadialCase.film(GRID, true));
        Split one = Split.of(flow, settings(0.01, 1), x -> {});
        Split four = Split.of(flow, settings(0.01, 4), x -> {});
        assertEquals(one.table(), four.table());
        Split stationary = Split.of(
                flow, new SplitSettings(Frame.STATIONARY, 1e-6, 0.01, 7, 2, SplitSettings.MOST_TRACERS), x -> {});
        for (SplitRow row : one.table()) {
            SplitRow other = stationary.row(row.from().orElseThrow(), row.to()).orElseThrow();
            assertEquals(row.share().share(), other.share().share(), 1e-3);
            assertEquals(
                    row.revolutions().orElseThrow().p50(),
                    other.revolutions().orElseThrow().p50(),
                    1e-3);
        }
    }

    /** Plain nodal interpolation is not exact: the split within 1 %, and the closure says how far it is off. */
    @Test
    void split_fullField_nearExactShares() {
        FilmFlow flow = new NodalFlow(RadialCase.fullFilm(GRID, 17, Frame.STATIONARY, Frame.ROTATING));
        SplitSettings few = new SplitSettings(Frame.ROTATING, 1e-6, 0.05, 7, 2, 1024);
        Split split = Split.of(flow, few, x -> {});
        double inner = split.row(Border.SUPPLY, Destination.INNER)
                .orElseThrow()
                .share()
                .share();
        assertEquals(0.571230, inner, 0.01);
        assertEquals(0, split.balance().closure(), 0.01);
        assertEquals(RadialCase.INNER_FLOW, split.balance().innerOut(), 0.01 * RadialCase.INNER_FLOW);
    }
}
