package org.whither.io.result;

import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import org.whither.fate.BorderBalance;
import org.whither.fate.FilmMass;
import org.whither.film.Correction;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.FullField;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.Supply;
import org.whither.film.Validity;

/** What a field file holds, how its border flows close, and how far its film keeps to what is assumed of it. */
public final class FieldSummary {
    private static final double DOUBTFUL_CORRECTION = 0.01;

    private final FilmFlow flow;
    private final Film film;
    private final BorderBalance balance;
    private final Validity validity;
    private final double mass;
    private final double[] pressure = {Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY};
    private final double[] thickness = {Double.POSITIVE_INFINITY, Double.NEGATIVE_INFINITY};

    /**
     * Gathers the summary.
     *
     * @param flow the motion of the gas
     */
    public FieldSummary(FilmFlow flow) {
        this.flow = flow;
        this.film = flow.film();
        this.balance = BorderBalance.of(flow);
        this.validity = Validity.of(flow);
        this.mass = FilmMass.of(flow);
        for (int n = 0; n < film.faces().size(); n++) {
            note(thickness, film.faces().thickness(n));
        }
        if (film.field() instanceof LubricationField field) {
            for (int n = 0; n < field.size(); n++) {
                note(pressure, field.pressure(n));
            }
        } else if (film.field() instanceof FullField field) {
            int levels = field.pressureConstantAcrossFilm() ? 1 : field.nk();
            for (int n = 0; n < film.grid().nodes(); n++) {
                for (int k = 0; k < levels; k++) {
                    note(pressure, field.pressure(n, k));
                }
            }
        }
    }

    private static void note(double[] range, double value) {
        range[0] = Math.min(range[0], value);
        range[1] = Math.max(range[1], value);
    }

    /** The lowest and the highest pressure of the field (Pa); a copy. */
    public double[] pressures() {
        return pressure.clone();
    }

    /** Whether the border flows of the field, before any correction, close well enough to act on. */
    public boolean closes() {
        return verdict() == ClosureVerdict.CLOSES;
    }

    private ClosureVerdict verdict() {
        return ClosureVerdict.of(closure());
    }

    /** How the border flows close by the field itself, before any correction, as a share of the inflow. */
    private double closure() {
        return BorderBalance.closureOfField(flow, balance);
    }

    /** What a user must know, a sentence each. */
    public List<String> warnings() {
        List<String> said = new ArrayList<>();
        if (!(balance.inflow() > 0)) {
            said.add("No gas enters the film over any border: there is nothing to follow.");
        } else if (verdict() == ClosureVerdict.NO_RESULT) {
            said.add(String.format(
                    Locale.ROOT,
                    "NOT SOUND: %.2f %% of the inflow is missing or too much in the border flows of the field, above %.0f %%."
                            + " The field is not converged, or a part of its border is not in the file; a split of it is no"
                            + " result.",
                    100 * closure(),
                    100 * ClosureVerdict.NO_RESULT_ABOVE));
        } else if (verdict() == ClosureVerdict.DOUBTFUL) {
            said.add(String.format(
                    Locale.ROOT,
                    "The border flows of the field do not close: %.3f %% of the inflow is missing or too much, above %.1f %%;"
                            + " the field may not be converged, or a part of its border is not in the file.",
                    100 * closure(),
                    100 * ClosureVerdict.DOUBTFUL_ABOVE));
        }
        if (film.supply().isEmpty()) {
            said.add("The file names no feed (/supply): there is no supply gas to account for.");
        } else if (!(balance.supplyIn() > 0)) {
            said.add("No gas enters through the feed.");
        }
        correctionWarning(flow).ifPresent(said::add);
        said.addAll(validity.warnings());
        return said;
    }

    /** What must be said where the flows of a field had to be changed much to conserve mass. */
    static Optional<String> correctionWarning(FilmFlow flow) {
        double changed = flow.correction().map(Correction::share).orElse(0.0);
        return changed > DOUBTFUL_CORRECTION
                ? Optional.of(String.format(
                        Locale.ROOT,
                        "The mass flows of the cells had to be changed by %.1f %% to balance: the %s in the file do not"
                                + " satisfy continuity well.",
                        100 * changed,
                        flow.film().field() instanceof FullField ? "velocities" : "pressure and the film thickness"))
                : Optional.empty();
    }

    /** The summary in plain words and the engineer's units. */
    public String text() {
        FilmGrid grid = film.grid();
        StringBuilder s = new StringBuilder();
        line(s, "Field", film.heading().title());
        line(s, "Computed by", film.heading().origin());
        line(s, "Created", film.heading().created());
        line(
                s,
                "Kind",
                film.field() instanceof FullField full
                        ? "full field, " + full.nk() + " levels across the film"
                        : "film field (pressure" + lubricationKind() + ")");
        line(
                s,
                "Grid",
                grid.ni() + " × " + grid.nj() + " nodes, 1 of "
                        + (grid.sectors() == 1 ? "1 sector (the whole ring)" : grid.sectors() + " sectors"));
        line(
                s,
                "Radii",
                EngineerUnits.millimetres(grid.innerRadius()) + " … " + EngineerUnits.millimetres(grid.outerRadius()));
        line(
                s,
                "Film thickness",
                EngineerUnits.micrometres(thickness[0]) + " … " + EngineerUnits.micrometres(thickness[1]));
        line(s, "Pressure", EngineerUnits.pressure(pressure[0]) + " … " + EngineerUnits.pressure(pressure[1]));
        line(
                s,
                "Inner diameter",
                film.conditions().innerSide() + ", "
                        + EngineerUnits.pressure(film.conditions().pressureInner()));
        line(
                s,
                "Outer diameter",
                film.conditions().outerSide() + ", "
                        + EngineerUnits.pressure(film.conditions().pressureOuter()));
        film.conditions().pressureSupply().ifPresent(p -> line(s, "Supply", EngineerUnits.pressure(p)));
        line(s, "Feed", feed());
        line(
                s,
                "Speed",
                EngineerUnits.speed(film.conditions().rotationRate())
                        + (film.conditions().rotationRate() < 0 ? " (towards −θ)" : " (towards +θ)"));
        line(
                s,
                "Temperature",
                String.format(Locale.ROOT, "%.2f K", film.conditions().temperature()));
        line(
                s,
                "Gas",
                String.format(
                        Locale.ROOT,
                        "%s, %.4f g/mol, %.4f µPa·s, Z = %.4f",
                        film.gas().name(),
                        1e3 * film.gas().molarMass(),
                        1e6 * film.gas().viscosity(),
                        film.gas().compressibilityFactor()));
        line(
                s,
                "Frames",
                "velocities measured in the " + lower(film.velocityFrame()) + " frame, steady in the "
                        + lower(film.steadyIn()) + " frame");
        line(s, "Interpolation", flow.interpolation());
        s.append('\n');
        flowLine(s, "Supply in", balance.supplyIn());
        if (balance.supplyOut() > 0) {
            flowLine(s, "Back into feed", balance.supplyOut());
        }
        flowLine(s, "Inner out", balance.innerOut());
        flowLine(s, "Inner in", balance.innerIn());
        flowLine(s, "Outer out", balance.outerOut());
        flowLine(s, "Outer in", balance.outerIn());
        line(
                s,
                "Closure",
                balance.inflow() > 0
                        ? String.format(Locale.ROOT, "%.4f %% of the inflow", 100 * closure())
                        : "none: nothing enters");
        flow.correction()
                .ifPresent(correction -> line(
                        s,
                        "Correction",
                        String.format(
                                Locale.ROOT,
                                "%.2g %% of the flows between cells, at most %.2g %% of those of one cell",
                                100 * correction.share(),
                                100 * correction.largestShare())));
        line(s, "Gas in the film", String.format(Locale.ROOT, "%.4g mg", 1e6 * mass));
        s.append('\n');
        bound(s, "Reduced Reynolds", validity.reducedReynolds(), Validity.REYNOLDS_BOUND);
        bound(s, "Knudsen", validity.knudsen(), Validity.KNUDSEN_BOUND);
        bound(s, "Exit Mach", validity.exitMach(), Validity.MACH_BOUND);
        if (film.faces().at() == Location.NODE) {
            bound(s, "Film slope", validity.slope(), Validity.SLOPE_BOUND);
        }
        return s.toString();
    }

    private String lubricationKind() {
        LubricationField field = (LubricationField) film.field();
        return (field.pressureAt() == Location.NODE ? " at the nodes" : " at the cell centres")
                + (field.massFlows().isPresent() ? ", with mass flows through the cell faces" : ", without mass flows");
    }

    private String feed() {
        Optional<Supply> supply = film.supply();
        if (supply.isEmpty()) {
            return "none";
        }
        String face = "in the " + supply.get().face().name().toLowerCase(Locale.ROOT);
        Optional<Supply.Annulus> annulus = supply.get().annulus();
        return annulus.isPresent()
                ? "annulus " + EngineerUnits.millimetres(annulus.get().from()) + " … "
                        + EngineerUnits.millimetres(annulus.get().to()) + " " + face
                : "cells of a mask " + face;
    }

    private static String lower(Enum<?> value) {
        return value.name().toLowerCase(Locale.ROOT);
    }

    private static void line(StringBuilder s, String name, String value) {
        if (value != null && !value.isBlank()) {
            s.append(String.format(Locale.ROOT, "%-17s %s%n", name, value));
        }
    }

    private void flowLine(StringBuilder s, String name, double massFlow) {
        line(s, name, EngineerUnits.massFlow(massFlow, film.gas()));
    }

    private static void bound(StringBuilder s, String name, double value, double bound) {
        line(
                s,
                name,
                String.format(
                        Locale.ROOT, "%.3g (%s the bound of %.2g)", value, value > bound ? "ABOVE" : "below", bound));
    }

    /**
     * The summary as JSON; SI units.
     *
     * @param file name of the field file
     * @param sha256 its checksum
     */
    public ObjectNode json(String file, String sha256) {
        FilmGrid grid = film.grid();
        ObjectNode root = JsonNodeFactory.instance.objectNode();
        root.put("result", "check");
        root.put("version", 1);
        root.set("field", ResultJson.field(film, file, sha256));
        root.put("kind", film.field() instanceof FullField ? "full" : "film");
        ObjectNode nodes = root.putObject("grid");
        nodes.put("ni", grid.ni());
        nodes.put("nj", grid.nj());
        nodes.put("sectors", grid.sectors());
        nodes.put("inner_radius", grid.innerRadius());
        nodes.put("outer_radius", grid.outerRadius());
        root.putArray("film_thickness").add(thickness[0]).add(thickness[1]);
        root.putArray("pressure").add(pressure[0]).add(pressure[1]);
        root.put("rotation_rate", film.conditions().rotationRate());
        root.put("interpolation", flow.interpolation());
        root.put("field_closure", closure());
        root.put("closure_verdict", verdict().word());
        flow.correction().ifPresent(correction -> {
            root.put("flow_correction", correction.share());
            root.put("largest_flow_correction", correction.largestShare());
        });
        root.put("film_mass", mass);
        root.set("balance", ResultJson.balance(balance));
        root.set("validity", ResultJson.validity(validity));
        warnings().forEach(root.putArray("warnings")::add);
        root.put("caution", Cautions.TEXT);
        return root;
    }
}
