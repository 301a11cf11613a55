package org.whither.trace;

import java.util.List;
import java.util.function.IntSupplier;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.PackedFlow;

/**
 * Follows many tracers side by side, each as {@link Tracer} follows one: piece by piece of the film, with the same pair,
 * control of the step and ends. A batch holds as many tracers as there are lanes; each takes steps of its own, and where
 * one ends the next takes its lane. No lane knows of another, so what becomes of a tracer depends on nothing but its
 * release.
 *
 * <p>Places are kept as parts of the piece, in which the passage from one piece to the next is exact; times, and the
 * state, in double precision.
 *
 * <p>An instance belongs to one thread.
 */
final class BatchTracer {
    private static final int LANES = PackedFlow.LANES;
    private static final double SEALED_EDGE = 1e-9;
    private static final int MOST_PIECES = 3_000_000;
    private static final int MOST_HALVINGS = 60;
    private static final int ITERATIONS_BETWEEN_LOOKS = 256;

    private final FilmFlow flow;
    private final PackedFlow packed;
    private final FilmGrid grid;
    private final TraceSettings settings;
    private final BatchSteps steppers;
    private final int sign;
    private final double steadyTurn;
    private final double stationaryTurn;
    private final double steadyFrameSpeed;
    private final double pitch;
    private final double perExtent;
    private final double perThickness;

    private final Lanes lanes = new Lanes();
    private final int[] release = new int[LANES];
    private final int[] i = new int[LANES];
    private final int[] j = new int[LANES];
    private final int[] k = new int[LANES];
    private final long[] sectorsPassed = new long[LANES];
    private final double[] time = new double[LANES];
    private final int[] pieces = new int[LANES];
    private final int[] halvings = new int[LANES];
    private final QuickControl control = new QuickControl(LANES);
    private final double[] length = new double[LANES];
    private final double[] lowestSquare = new double[LANES];
    private final double[] highestSquare = new double[LANES];
    private final double[] lastZ = new double[LANES];
    private final boolean[] measured = new boolean[LANES];
    private final boolean[] entered = new boolean[LANES];
    private final double[] point = new double[4];
    private int active;
    private long steps;
    private long rejectedSteps;
    private long told;
    private int ended;

    private List<Release> releases;
    private StepWatcher watcher;
    private PathEnd[] ends;
    private PathMeasure[] measures;

    BatchTracer(FilmFlow flow, PackedFlow packed, TraceSettings settings, BatchSteps steppers) {
        Film film = flow.film();
        this.flow = flow;
        this.packed = packed;
        this.grid = film.grid();
        this.settings = settings;
        this.steppers = steppers;
        this.sign = settings.direction().sign();
        double frameSpeed = settings.frame().angularSpeed(film.conditions().rotationRate());
        this.steadyFrameSpeed = film.steadyFrameSpeed();
        this.steadyTurn = steadyFrameSpeed - frameSpeed;
        this.stationaryTurn = frameSpeed;
        this.pitch = grid.pitch();
        this.perExtent = 1 / (settings.tolerance() * (grid.outerRadius() - grid.innerRadius()));
        this.perThickness = 1 / settings.tolerance();
    }

    /** Watches the steps of all tracers. */
    @FunctionalInterface
    interface StepWatcher {
        /**
         * Called once for each step that is kept; for one tracer in order of time.
         *
         * @param release number of the tracer's release
         * @param step the step, as {@link PointFinder} keeps one; overwritten after the call
         */
        void step(int release, double[] step);
    }

    private final double[] watched = new double[PointFinder.STEP];

    /** Has a watcher told of every step from now on. */
    void watch(StepWatcher next) {
        watcher = next;
    }

    private void tell(int lane, double tried, double fraction) {
        watched[0] = time[lane];
        watched[1] = tried;
        watched[2] = fraction;
        watched[3] = i[lane];
        watched[4] = j[lane];
        watched[5] = k[lane];
        watched[6] = sectorsPassed[lane];
        for (int n = 0; n < 3; n++) {
            int at = PointFinder.EXTENSION_AT + n * DormandPrince54.EXTENSION;
            watched[at] = number(Lanes.START + n, lane);
            for (int power = 0; power < 4; power++) {
                watched[at + 1 + power] = number(Lanes.POWER + 3 * power + n, lane);
            }
        }
        watcher.step(release[lane], watched);
    }

    long steps() {
        return steps;
    }

    long rejectedSteps() {
        return rejectedSteps;
    }

    /**
     * Follows tracers until there are no more, or the thread is interrupted.
     *
     * @param releases where they start
     * @param next gives the number of the next release to follow, negative where there is none
     * @param ends their ends; those of the releases followed are overwritten
     * @param measures likewise what they met, or null
     * @param progress told now and then how many more have ended
     */
    void follow(
            List<Release> releases,
            IntSupplier next,
            PathEnd[] ends,
            PathMeasure[] measures,
            java.util.function.IntConsumer progress) {
        this.releases = releases;
        this.ends = ends;
        this.measures = measures;
        active = 0;
        while (active < LANES && fill(active, next)) {
            active++;
        }
        BatchStep step = steppers.best();
        for (int iteration = 1; active > 0; iteration++) {
            load();
            step.attempt(lanes, active, sign, perExtent, perThickness);
            int now = active;
            for (int lane = 0; lane < now; lane++) {
                if (goOn(lane)) {
                    continue;
                }
                if (!fill(lane, next)) {
                    release[lane] = -1;
                }
            }
            for (int lane = now - 1; lane >= 0; lane--) {
                if (release[lane] < 0) {
                    active--;
                    if (lane != active) {
                        move(active, lane);
                    }
                }
            }
            if (iteration % ITERATIONS_BETWEEN_LOOKS == 0 || active == 0) {
                if (Thread.currentThread().isInterrupted()) {
                    return;
                }
                progress.accept(ended);
                ended = 0;
                steppers.worked(steps + rejectedSteps - told);
                told = steps + rejectedSteps;
                step = steppers.best();
            }
        }
    }

    // ---- the lanes -------------------------------------------------------------------------------------------------

    /** Gives a lane the next release that lies in the film; false where there is none. */
    private boolean fill(int lane, IntSupplier next) {
        int n;
        while ((n = next.getAsInt()) >= 0) {
            release[lane] = n;
            time[lane] = 0;
            if (place(lane, releases.get(n))) {
                return true;
            }
        }
        return false;
    }

    private boolean place(int lane, Release from) {
        double r = from.radius();
        double sigma = from.sigma();
        length[lane] = 0;
        lowestSquare[lane] = Double.NaN;
        highestSquare[lane] = Double.NaN;
        measured[lane] = false;
        if (!(r >= grid.innerRadius()
                && r <= grid.outerRadius()
                && sigma >= 0
                && sigma <= 1
                && Math.abs(from.theta()) < 1e9)) {
            PathEnd.Position position = new PathEnd.Position(from.theta(), from.theta(), r, sigma);
            end(lane, new PathEnd.Failed(0, position, "released outside the film"));
            return false;
        }
        j[lane] = grid.row(r);
        sectorsPassed[lane] = grid.intoSector(from.theta(), j[lane], r);
        double theta = from.theta() - sectorsPassed[lane] * pitch;
        i[lane] = grid.column(theta, j[lane], r);
        int layer = 0;
        while (layer < flow.layers() - 1 && flow.level(layer + 1) <= sigma) {
            layer++;
        }
        k[lane] = layer;
        double left = grid.lineTheta(i[lane], j[lane], r);
        double width = grid.lineTheta(i[lane] + 1, j[lane], r) - left;
        double inner = grid.radius(j[lane]);
        put(Lanes.START, lane, (theta - left) / width);
        put(Lanes.START + 1, lane, (r - inner) / (grid.radius(j[lane] + 1) - inner));
        double low = flow.level(layer);
        put(Lanes.START + 2, lane, (sigma - low) / (flow.level(layer + 1) - low));
        put(Lanes.WANTED, lane, Double.POSITIVE_INFINITY);
        put(Lanes.LEFT, lane, settings.timeLimit());
        pieces[lane] = 0;
        halvings[lane] = 0;
        control.begin(lane);
        enter(lane);
        return true;
    }

    /** Notes that a lane has entered a piece, whose motion is to be loaded before its next step. */
    private void enter(int lane) {
        entered[lane] = true;
    }

    /**
     * Loads the motion of the pieces just entered: one after another, so that the processor waits for the memory of several
     * at once.
     */
    private void load() {
        for (int lane = 0; lane < active; lane++) {
            if (entered[lane]) {
                entered[lane] = false;
                load(lane);
            }
        }
    }

    private void load(int lane) {
        int layer = k[lane];
        int column = i[lane];
        int row = j[lane];
        packed.load(column, row, layer, lanes.raw, lane);
        if (measures != null) {
            packed.loadMeasure(column, row, layer, lanes.rawMeasure, lane);
        }
        boolean below = packed.sealedBelow(column, row, layer);
        boolean above = packed.sealedAbove(column, row, layer);
        put(Lanes.BOUND, lane, below ? Double.NEGATIVE_INFINITY : -BatchStep.EDGE);
        put(Lanes.BOUND + 1, lane, above ? Double.POSITIVE_INFINITY : 1 + BatchStep.EDGE);
    }

    private void move(int from, int to) {
        for (int n = 0; n < 3; n++) {
            put(Lanes.START + n, to, number(Lanes.START + n, from));
        }
        put(Lanes.WANTED, to, number(Lanes.WANTED, from));
        put(Lanes.LEFT, to, number(Lanes.LEFT, from));
        release[to] = release[from];
        i[to] = i[from];
        j[to] = j[from];
        k[to] = k[from];
        sectorsPassed[to] = sectorsPassed[from];
        time[to] = time[from];
        pieces[to] = pieces[from];
        halvings[to] = halvings[from];
        control.move(from, to);
        length[to] = length[from];
        lowestSquare[to] = lowestSquare[from];
        highestSquare[to] = highestSquare[from];
        lastZ[to] = lastZ[from];
        measured[to] = measured[from];
        enter(to);
    }

    private double number(int n, int lane) {
        return lanes.state[n * LANES + lane];
    }

    private void put(int n, int lane, double value) {
        lanes.state[n * LANES + lane] = value;
    }

    // ---- after a step ----------------------------------------------------------------------------------------------

    /** Keeps or throws away the step that a lane tried; false where its path has ended. */
    private boolean goOn(int lane) {
        double tried = number(Lanes.STEP, lane);
        double error = number(Lanes.ERROR, lane);
        if (Double.isNaN(number(Lanes.FASTEST, lane))) {
            return fail(lane, "the velocity is not a number");
        }
        if (!(number(Lanes.CHECK, lane) < Double.POSITIVE_INFINITY)) {
            error = Double.POSITIVE_INFINITY;
        }
        boolean through = error <= 1 && throughSealedFace(lane);
        if (!(error <= 1) || through) {
            rejectedSteps++;
            if (++halvings[lane] > MOST_HALVINGS) {
                return fail(lane, "the step became too small");
            }
            put(Lanes.WANTED, lane, tried * (through ? 0.5 : control.afterRejected(lane, error)));
            return true;
        }
        steps++;
        halvings[lane] = 0;
        double fraction = number(Lanes.FRACTION, lane);
        if (fraction < 0) {
            fraction = WayOut.search(lanes.state, lane);
        }
        int way = (int) number(Lanes.WAY, lane);
        if (measures != null) {
            measure(lane, fraction * tried);
        }
        if (watcher != null) {
            tell(lane, tried, fraction);
        }
        time[lane] += fraction * tried;
        double left = settings.timeLimit() - time[lane];
        put(Lanes.LEFT, lane, left);
        put(Lanes.WANTED, lane, tried * control.afterAccepted(lane, error));
        put(Lanes.START, lane, number(Lanes.NEXT, lane));
        put(Lanes.START + 1, lane, number(Lanes.NEXT + 1, lane));
        put(Lanes.START + 2, lane, number(Lanes.NEXT + 2, lane));
        if (way == 0) {
            if (time[lane] >= settings.timeLimit() * (1 - 1e-14)) {
                return end(lane, new PathEnd.StillInside(time[lane], position(lane)));
            }
            return true;
        }
        return pass(lane, way);
    }

    private boolean throughSealedFace(int lane) {
        double c = number(Lanes.END + 2, lane);
        return c < -SEALED_EDGE && number(Lanes.BOUND, lane) == Double.NEGATIVE_INFINITY
                || c > 1 + SEALED_EDGE && number(Lanes.BOUND + 1, lane) == Double.POSITIVE_INFINITY;
    }

    /** Moves over a border of the piece; false where that is a border of the film. */
    private boolean pass(int lane, int way) {
        int along = Math.abs(way) - 1;
        int onwards = way > 0 ? 1 : -1;
        put(Lanes.START + along, lane, way > 0 ? 1 : 0);
        switch (along) {
            case 0:
                i[lane] += onwards;
                if (i[lane] < 0) {
                    i[lane] = grid.cellsTheta() - 1;
                    sectorsPassed[lane]--;
                } else if (i[lane] == grid.cellsTheta()) {
                    i[lane] = 0;
                    sectorsPassed[lane]++;
                }
                break;
            case 1:
                int row = j[lane] + onwards;
                if (row < 0 || row == grid.cellsRadial()) {
                    PathEnd.Border border = row < 0 ? PathEnd.Border.INNER : PathEnd.Border.OUTER;
                    return end(lane, new PathEnd.Left(border, time[lane], position(lane)));
                }
                j[lane] = row;
                break;
            default:
                int layer = k[lane] + onwards;
                if (layer < 0 || layer == flow.layers()) {
                    return end(lane, new PathEnd.Left(PathEnd.Border.SUPPLY, time[lane], position(lane)));
                }
                k[lane] = layer;
                break;
        }
        put(Lanes.START + along, lane, way > 0 ? 0 : 1);
        if (++pieces[lane] >= MOST_PIECES) {
            return fail(lane, "it passed " + MOST_PIECES + " pieces of the film without leaving it");
        }
        // A path may graze a sealed face, by no more than SEALED_EDGE.
        if (along != 2) {
            double c = number(Lanes.START + 2, lane);
            if (c < 0 && number(Lanes.BOUND, lane) == Double.NEGATIVE_INFINITY) {
                put(Lanes.START + 2, lane, 0);
            } else if (c > 1 && number(Lanes.BOUND + 1, lane) == Double.POSITIVE_INFINITY) {
                put(Lanes.START + 2, lane, 1);
            }
        }
        enter(lane);
        return true;
    }

    private PathEnd.Position position(int lane) {
        double b = number(Lanes.START + 1, lane);
        int row = j[lane];
        double r = b == 1 ? grid.radius(row + 1) : grid.radius(row) + b * (grid.radius(row + 1) - grid.radius(row));
        double left = grid.lineTheta(i[lane], row, r);
        double steady = left
                + number(Lanes.START, lane) * (grid.lineTheta(i[lane] + 1, row, r) - left)
                + sectorsPassed[lane] * pitch;
        double theta = steady + steadyTurn * sign * time[lane];
        double low = flow.level(k[lane]);
        double sigma = low + number(Lanes.START + 2, lane) * (flow.level(k[lane] + 1) - low);
        return new PathEnd.Position(
                theta, theta + stationaryTurn * sign * time[lane], r, Math.max(0, Math.min(1, sigma)));
    }

    private boolean fail(int lane, String reason) {
        return end(lane, new PathEnd.Failed(time[lane], position(lane), reason));
    }

    /** Notes how the path of a lane ended; false. */
    private boolean end(int lane, PathEnd end) {
        int n = release[lane];
        ends[n] = end;
        if (measures != null) {
            measures[n] = new PathMeasure(length[lane], Math.sqrt(lowestSquare[lane]), Math.sqrt(highestSquare[lane]));
        }
        ended++;
        return false;
    }

    // ---- what is met on the way; see PathMeter ---------------------------------------------------------------------

    private void measure(int lane, double taken) {
        locate(Lanes.START, lane);
        double fromTheta = point[0];
        double fromRadius = point[1];
        if (!measured[lane]) {
            measured[lane] = true;
            lastZ[lane] = point[2];
            lowestSquare[lane] = point[3];
            highestSquare[lane] = point[3];
        }
        locate(Lanes.NEXT, lane);
        double around = 0.5 * (fromRadius + point[1]) * (point[0] - fromTheta + steadyFrameSpeed * sign * taken);
        double out = point[1] - fromRadius;
        double across = point[2] - lastZ[lane];
        length[lane] += Math.sqrt(around * around + out * out + across * across);
        lastZ[lane] = point[2];
        lowestSquare[lane] = Math.min(lowestSquare[lane], point[3]);
        highestSquare[lane] = Math.max(highestSquare[lane], point[3]);
    }

    /** Angle from the first corner of the cell (rad), radius (m), height (m) and square of the pressure (Pa²) of a place. */
    private void locate(int place, int lane) {
        double a = number(place, lane);
        double b = number(place + 1, lane);
        double c = number(place + 2, lane);
        double[] raw = lanes.raw;
        double width = raw[PackedFlow.WIDTH_0 * LANES + lane];
        double widening = raw[PackedFlow.WIDTH_1 * LANES + lane] - width;
        point[0] = b * raw[PackedFlow.RISE * LANES + lane] + a * (width + b * widening);
        point[1] = raw[PackedFlow.RADIUS * LANES + lane] + b * raw[PackedFlow.DEPTH * LANES + lane];
        double sigma = raw[PackedFlow.SIGMA * LANES + lane] + c * raw[PackedFlow.LAYER * LANES + lane];
        double[] more = lanes.rawMeasure;
        double rotor = plane(more, PackedFlow.ROTOR_00, 2, 1, a, b, lane);
        double thickness = plane(raw, PackedFlow.THICKNESS_00, 2, 1, a, b, lane);
        point[2] = rotor + Math.max(0, Math.min(1, sigma)) * thickness;
        double low = plane(more, PackedFlow.PRESSURE_000, 4, 2, a, b, lane);
        double high = plane(more, PackedFlow.PRESSURE_000 + 1, 4, 2, a, b, lane);
        point[3] = low + c * (high - low);
    }

    private static double plane(double[] numbers, int at, int onA, int onB, double a, double b, int lane) {
        double n00 = numbers[at * LANES + lane];
        double n10 = numbers[(at + onA) * LANES + lane];
        double n01 = numbers[(at + onB) * LANES + lane];
        double n11 = numbers[(at + onA + onB) * LANES + lane];
        return (1 - a) * ((1 - b) * n00 + b * n01) + a * ((1 - b) * n10 + b * n11);
    }
}
