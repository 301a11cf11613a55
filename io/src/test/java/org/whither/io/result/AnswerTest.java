package org.whither.io.result;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.junit.jupiter.api.Test;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.Interval;
import org.whither.fate.Split;
import org.whither.fate.SplitRow;
import org.whither.fate.SplitSettings;
import org.whither.fate.Uncertainty;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.samples.GridSize;
import org.whither.samples.SampleSeals;
import org.whither.trace.PathEnd;

/** What the answer says in every case. */
class AnswerTest {
    private static final Film FILM =
            SampleSeals.compute("spiral", null, new GridSize(8, 16), x -> {}).film();
    private static final SplitSettings SETTINGS = new SplitSettings(Frame.ROTATING, 1e-6, 0.002, 1, 1, 1000);
    private static final BorderBalance PLAIN = new BorderBalance(1e-4, 0, 0, 0.387e-4, 0, 0.613e-4);

    private final List<SplitRow> table = new ArrayList<>();

    private AnswerTest row(PathEnd.Border from, Destination to, double share, double low, double high) {
        table.add(new SplitRow(
                Optional.of(from),
                to,
                share * 1e-4,
                new Interval(share, low, high),
                Optional.empty(),
                Optional.empty(),
                OptionalDouble.empty(),
                Optional.empty()));
        return this;
    }

    private AnswerTest supply(double inner, double outer, double half) {
        return row(PathEnd.Border.SUPPLY, Destination.INNER, inner, inner - half, inner + half)
                .row(PathEnd.Border.SUPPLY, Destination.OUTER, outer, outer - half, outer + half);
    }

    private String answer(BorderBalance balance) {
        return answer(balance, true, FILM);
    }

    private String answer(BorderBalance balance, boolean reached, Film film) {
        Split split = new Split(
                table,
                List.of(),
                balance,
                List.of(),
                0,
                0,
                0,
                reached,
                List.of(),
                new Uncertainty(
                        new Uncertainty.Integration(1e-7, 0, Double.NaN, Double.NaN), 0.002, 0, OptionalDouble.empty()),
                0.05,
                1e-7,
                1000,
                1000,
                List.of());
        return new SplitResult(FilmFlow.of(film), SETTINGS, split, "field.h5", "0", 1).answer();
    }

    private static Film sides(String inner, String outer) {
        Conditions c = FILM.conditions();
        return new Film(
                FILM.heading(),
                new Conditions(
                        c.rotationRate(),
                        c.pressureInner(),
                        c.pressureOuter(),
                        c.pressureSupply(),
                        c.temperature(),
                        inner,
                        outer),
                FILM.gas(),
                FILM.grid(),
                FILM.faces(),
                FILM.velocityFrame(),
                FILM.steadyIn(),
                FILM.field(),
                FILM.supply());
    }

    @Test
    void answer_supplyAlone() {
        assertEquals(
                "Of every 100 kg of supply gas, 61.3 leave to the process and 38.7 to the atmosphere (±0.1)."
                        + " No process gas enters the film.",
                supply(0.387, 0.613, 0.001).answer(PLAIN));
    }

    @Test
    void answer_processGasEntersAndNoneIsFoundToCross_isBounded() {
        // 0.2 of the inflow of 1e-5 kg/s at most: 2e-6 of a leakage of 3.87e-5 kg/s is 5.17 %.
        BorderBalance balance = new BorderBalance(1e-4, 0, 0, 0.387e-4, 1e-5, 0.713e-4);
        assertEquals(
                "Of every 100 kg of supply gas, 61.3 leave to the process and 38.7 to the atmosphere (±0.1)."
                        + " No process gas was found to reach the atmosphere: less than 5.2 % of the leakage to it"
                        + " (36.00 g/h enter the film).",
                supply(0.387, 0.613, 0.001)
                        .row(PathEnd.Border.OUTER, Destination.INNER, 0, 0, 0.2)
                        .row(PathEnd.Border.OUTER, Destination.OUTER, 1, 0.8, 1)
                        .answer(balance));
    }

    @Test
    void answer_smallBound_isRoundedUp() {
        // 7.1e-4 · 1e-5 / 3.87e-5 = 0.01835 % of the leakage, and so less than 0.02 %.
        BorderBalance balance = new BorderBalance(1e-4, 0, 0, 0.387e-4, 1e-5, 0.713e-4);
        String answer = supply(0.387, 0.613, 0.001)
                .row(PathEnd.Border.OUTER, Destination.INNER, 0, 0, 7.1e-4)
                .answer(balance);
        assertTrue(answer.contains("less than 0.02 % of the leakage to it"), answer);
    }

    @Test
    void answer_processGasCrosses_saysSoLoud() {
        BorderBalance balance = new BorderBalance(1e-4, 0, 0, 0.41e-4, 1e-5, 0.69e-4);
        String answer = supply(0.385, 0.615, 0.001)
                .row(PathEnd.Border.OUTER, Destination.INNER, 0.25, 0.24, 0.26)
                .answer(balance);
        assertTrue(
                answer.endsWith(
                        "Process gas REACHES the atmosphere: 9.000 g/h, 6.1 % of the leakage to it (36.00 g/h enter"
                                + " the film)."),
                answer);
    }

    @Test
    void answer_noGasEntersThroughTheFeed() {
        BorderBalance lost = new BorderBalance(0, 0, 0, 1e-5, 1e-5, 0);
        String answer =
                row(PathEnd.Border.OUTER, Destination.INNER, 1, 0.998, 1).answer(lost);
        assertEquals(
                "No supply gas enters the film. Process gas REACHES the atmosphere: 36.00 g/h, 100.0 % of the leakage to it"
                        + " (36.00 g/h enter the film).",
                answer);
        // What rounding leaves is no flow.
        assertTrue(answer(new BorderBalance(0, 1e-20, 0, 1e-5, 1e-5, 0)).startsWith("No supply gas enters the film. "));
        BorderBalance backwards = new BorderBalance(0, 2e-6, 0, 0.8e-5, 1e-5, 0);
        assertTrue(answer(backwards)
                .startsWith("No supply gas enters the film: 7.200 g/h of its gas leave through the feed."));
    }

    @Test
    void answer_fieldWithoutFeed() {
        Film none = new Film(
                FILM.heading(),
                FILM.conditions(),
                FILM.gas(),
                FILM.grid(),
                FILM.faces(),
                FILM.velocityFrame(),
                FILM.steadyIn(),
                FILM.field(),
                Optional.empty());
        String answer = row(PathEnd.Border.OUTER, Destination.INNER, 1, 0.998, 1)
                .answer(new BorderBalance(0, 0, 0, 1e-5, 1e-5, 0), true, none);
        assertTrue(
                answer.startsWith("The field names no feed: there is no supply gas to account for. Process gas"),
                answer);
    }

    @Test
    void answer_gasFromTheAtmosphereIsDrawnIn() {
        BorderBalance balance = new BorderBalance(1e-4, 0, 2e-5, 0.2e-4, 0, 1e-4);
        String answer = supply(0.2, 0.8, 0.001)
                .row(PathEnd.Border.INNER, Destination.OUTER, 0.5, 0.49, 0.51)
                .answer(balance);
        assertTrue(
                answer.endsWith(
                        "No process gas enters the film. Gas from the atmosphere REACHES the process: 36.00 g/h,"
                                + " 10.0 % of the leakage to it (72.00 g/h enter the film)."),
                answer);
    }

    @Test
    void answer_sidesTheOtherWayRound_namesThemRight() {
        BorderBalance balance = new BorderBalance(1e-4, 0, 1e-5, 0.5e-4, 0, 0.6e-4);
        String answer = supply(0.5, 0.5, 0.001)
                .row(PathEnd.Border.INNER, Destination.OUTER, 0, 0, 0.002)
                .answer(balance, true, sides("process", "atmosphere"));
        assertEquals(
                "Of every 100 kg of supply gas, 50.0 leave to the atmosphere and 50.0 to the process (±0.1). No process gas was"
                        + " found to reach the atmosphere: less than 0.04 % of the leakage to it (36.00 g/h enter the film).",
                answer);
    }

    @Test
    void answer_sidesOfOneName_areToldApartByDiameter() {
        String answer = supply(0.387, 0.613, 0.001).answer(PLAIN, true, sides("process", "process"));
        assertTrue(
                answer.startsWith(
                        "Of every 100 kg of supply gas, 61.3 leave to the process at the outer diameter and 38.7 to"
                                + " the process at the inner diameter (±0.1)."),
                answer);
        assertTrue(answer.contains("No gas from the process at the outer diameter enters the film."), answer);
    }

    @Test
    void answer_sidesWithoutNames() {
        String answer = supply(0.387, 0.613, 0.001).answer(PLAIN, true, sides("", ""));
        assertTrue(answer.contains("61.3 leave to the outer diameter and 38.7 to the inner diameter"), answer);
    }

    @Test
    void answer_widthNotReached_saysWhatWasWanted() {
        String answer = supply(0.387, 0.613, 0.0132).answer(PLAIN, false, FILM);
        assertTrue(answer.contains("(±1.4; the wanted ±0.1 was not reached)"), answer);
    }

    @Test
    void answer_narrowInterval_hasMoreDecimals() {
        String answer = supply(0.38712, 0.61288, 0.00004).answer(PLAIN);
        assertTrue(answer.contains("61.288 leave to the process and 38.712 to the atmosphere (±0.004)"), answer);
    }

    @Test
    void answer_gasHeldAndGasGoingBack_areTold() {
        String answer = supply(0.3, 0.6, 0.001)
                .row(PathEnd.Border.SUPPLY, Destination.SUPPLY, 0.04, 0.039, 0.041)
                .row(PathEnd.Border.SUPPLY, Destination.HELD, 0.06, 0.059, 0.061)
                .answer(PLAIN);
        assertTrue(
                answer.contains("(±0.1); 4.0 go back into the feed; 6.0 were still in the film after 50.00 ms."),
                answer);
    }

    @Test
    void answer_bordersThatDoNotClose_giveNone() {
        String answer = supply(0.387, 0.613, 0.001).answer(new BorderBalance(1e-4, 0, 0, 0.387e-4, 0, 0.563e-4));
        assertEquals(
                "No answer can be given: of the gas that enters the film of this field, 5.0 % is missing or too much where it"
                        + " leaves, above the 2 % that a result may have.",
                answer);
    }
}
