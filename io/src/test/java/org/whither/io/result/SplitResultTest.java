package org.whither.io.result;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.fate.BorderBalance;
import org.whither.fate.Interval;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.fate.SplitSettings;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.samples.GridSize;
import org.whither.samples.SampleSeals;

class SplitResultTest {
    private static final FilmFlow FLOW = FilmFlow.of(
            SampleSeals.compute("spiral", null, new GridSize(24, 32), x -> {}).film());
    private static final SplitSettings SETTINGS = new SplitSettings(Frame.ROTATING, 1e-5, 0.02, 3, 2, 20_000);
    private static final Split SPLIT = Split.of(FLOW, SETTINGS, x -> {});

    private static SplitResult result(Split split) {
        return new SplitResult(FLOW, SETTINGS, split, "field.h5", "0", 1);
    }

    /** The same split with another table or balance. */
    private static Split with(List<SplitRow> backward, BorderBalance balance) {
        return new Split(
                SPLIT.table(),
                backward,
                balance,
                SPLIT.fed(),
                SPLIT.heldShare(),
                SPLIT.lostShare(),
                SPLIT.unsettledShare(),
                SPLIT.widthReached(),
                SPLIT.maps(),
                SPLIT.uncertainty(),
                SPLIT.timeLimit(),
                SPLIT.filmMass(),
                SPLIT.tracers(),
                SPLIT.steps(),
                SPLIT.notes());
    }

    private static BorderBalance without(double share) {
        BorderBalance b = SPLIT.balance();
        return new BorderBalance(
                b.supplyIn(), b.supplyOut(), b.innerIn(), b.innerOut() - share * b.inflow(), b.outerIn(), b.outerOut());
    }

    @Test
    void json_split_hasWhatThePagePromises() {
        ObjectNode root = result(SPLIT).json();
        for (String key : List.of(
                "result",
                "version",
                "field",
                "frame",
                "tolerance",
                "width",
                "seed",
                "table",
                "held_share",
                "unsettled_share",
                "backward_table",
                "balance",
                "tracers",
                "steps",
                "wall_seconds",
                "validity",
                "warnings",
                "caution",
                "uncertainty",
                "maps")) {
            assertTrue(root.has(key), key);
        }
        double shares = 0;
        for (JsonNode row : root.get("table")) {
            assertTrue(row.get("share_low").asDouble() <= row.get("share").asDouble());
            assertTrue(row.get("share").asDouble() <= row.get("share_high").asDouble());
            shares += row.get("share").asDouble();
            if (row.has("exit_phase")) {
                double sum = 0;
                for (JsonNode bar : row.get("exit_phase")) {
                    sum += bar.asDouble();
                }
                assertEquals(1, sum, 1e-9);
                assertTrue(row.get("shortest_time").asDouble()
                        <= row.get("residence_time").get("p10").asDouble());
                assertTrue(row.get("pressure_range").get(0).asDouble()
                        <= row.get("lowest_pressure").get("p10").asDouble());
            }
        }
        assertEquals(1, shares, 1e-6);
        assertTrue(root.get("is_result").asBoolean());
    }

    @Test
    void text_split_fitsInto120Columns() {
        for (String line : result(SPLIT).text().split("\\R")) {
            assertTrue(line.length() <= 120, line.length() + ": " + line);
        }
    }

    @Test
    void warnings_closure_comesFirstAndBeyondTwoPercentIsNoResult() {
        assertTrue(result(SPLIT).warnings().stream().noneMatch(w -> w.contains("do not close") || w.contains("apart")));
        SplitResult doubtful = result(with(SPLIT.backwardTable(), without(0.008)));
        assertTrue(doubtful.text().startsWith("Warning: The border flows of the field do not close"));
        assertTrue(doubtful.isResult());
        SplitResult none = result(with(SPLIT.backwardTable(), without(0.025)));
        assertTrue(none.text().startsWith("Warning: NO RESULT"));
        assertFalse(none.isResult());
        assertFalse(none.closes());
        assertFalse(none.json().get("is_result").asBoolean());
    }

    @Test
    void warnings_threeWaysApart_saySo() {
        List<SplitRow> moved = SPLIT.backwardTable().stream()
                .map(row -> new SplitRow(
                        row.from(),
                        row.to(),
                        row.massFlow(),
                        new Interval(
                                row.share().share() + 0.1,
                                row.share().low() + 0.1,
                                row.share().high() + 0.1),
                        row.residenceTime(),
                        row.revolutions(),
                        row.shortestTime(),
                        row.travel()))
                .toList();
        assertTrue(result(with(moved, SPLIT.balance())).warnings().stream()
                .anyMatch(w -> w.contains("followed back: they are further apart")));
        assertTrue(result(with(SPLIT.backwardTable(), without(0.1))).warnings().stream()
                .anyMatch(w -> w.contains("by the boundary integral")));
    }
}
