package org.whither.trace;

import java.util.ArrayList;
import java.util.List;
import org.apache.commons.math3.analysis.solvers.BrentSolver;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * Follows tracers through a film, one at a time.
 *
 * <p>The flow is smooth inside each piece of the film (a cell of the grid and a layer across it) and only continuous, or
 * not even that, between them. So a path is integrated piece by piece: a step that ends beyond the border of its piece
 * is cut there, by root finding on its continuous extension, and the next one starts on the border. The error of a step
 * is controlled by {@link TraceSettings#tolerance}.
 *
 * <p>The angle of the state is measured in the frame of integration. Where the film is steady in another frame, it is met
 * at θ − ω t, ω being the speed of that frame seen from the frame of integration.
 *
 * <p>An instance may be used for many tracers after one another, but from one thread.
 */
public final class Tracer {
    private static final double EDGE = 1e-10;
    private static final double SEALED_EDGE = 1e-9;
    private static final int MOST_PIECES = 3_000_000;
    private static final int MOST_HALVINGS = 60;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final TraceSettings settings;
    private final double steadyTurn;
    private final double stationaryTurn;
    private final double extent;
    private final double pitch;
    private final boolean openRotor;
    private final boolean openStator;
    private final DormandPrince54 stepper = new DormandPrince54(3);
    private final BrentSolver rootFinder = new BrentSolver(1e-13, 1e-13);
    private final double[] rates = new double[3];
    private final double[] y = new double[3];
    private final double[] probe = new double[3];
    private final RightHandSide rightHandSide = this::evaluate;
    private final PointFinder finder;

    private int i;
    private int j;
    private int k;
    private long sectorsPassed;
    private double time;
    private long steps;
    private long rejectedSteps;

    /**
     * A tracer.
     *
     * @param flow the motion of the gas
     * @param settings how to follow it
     */
    public Tracer(FilmFlow flow, TraceSettings settings) {
        Film film = flow.film();
        this.flow = flow;
        this.grid = film.grid();
        this.settings = settings;
        double rotation = film.conditions().rotationRate();
        double frameSpeed = settings.frame().angularSpeed(rotation);
        this.steadyTurn = film.steadyFrameSpeed() - frameSpeed;
        this.stationaryTurn = frameSpeed;
        this.extent = grid.outerRadius() - grid.innerRadius();
        this.pitch = grid.pitch();
        this.finder = new PointFinder(flow, settings.frame(), settings.direction(), false);
        this.openRotor = film.supply().isPresent() && film.supply().get().face() == Face.ROTOR;
        this.openStator = film.supply().isPresent() && film.supply().get().face() == Face.STATOR;
    }

    /** Steps kept so far, over all tracers. */
    public long steps() {
        return steps;
    }

    /** Steps tried and thrown away so far, over all tracers. */
    public long rejectedSteps() {
        return rejectedSteps;
    }

    /**
     * Follows a tracer to its end.
     *
     * @param release where it starts
     * @return how it ended
     */
    public PathEnd follow(Release release) {
        return follow(release, null);
    }

    /**
     * Follows a tracer to its end and records a point at every border of a piece and at every step between.
     *
     * @param release where it starts
     * @return its path
     */
    public Path record(Release release) {
        List<PathPoint> points = new ArrayList<>();
        PathEnd end = follow(release, step -> {
            if (points.isEmpty()) {
                points.add(step.at(0));
            }
            points.add(step.at(1));
        });
        return new Path(release, points, end);
    }

    /**
     * Follows a tracer to its end while it is watched.
     *
     * @param release where it starts
     * @param observer who watches, or null
     * @return how it ended
     */
    public PathEnd follow(Release release, StepObserver observer) {
        if (!place(release)) {
            return failed("released outside the film");
        }
        StepControl control = new StepControl();
        double h = Double.POSITIVE_INFINITY;
        for (int pieces = 0; pieces < MOST_PIECES; pieces++) {
            stepper.start(rightHandSide, time, y);
            // Inside one piece.
            while (true) {
                double[] rate = stepper.startRate();
                double crossing = crossingTime(rate);
                if (Double.isNaN(crossing)) {
                    return failed("the velocity is not a number");
                }
                double left = settings.timeLimit() - time;
                h = Math.min(h, Math.min(1.1 * crossing, left));
                int halvings = 0;
                double error;
                while (true) {
                    stepper.attempt(rightHandSide, h);
                    error = errorNorm();
                    boolean through = error <= 1 && throughSealedFace(stepper.endState());
                    if (error <= 1 && !through) {
                        break;
                    }
                    rejectedSteps++;
                    if (++halvings > MOST_HALVINGS) {
                        return failed("the step became too small");
                    }
                    h *= through ? 0.5 : control.afterRejected(error);
                }
                int way = wayOut(stepper.endState());
                double part = 1;
                if (way == NO_WAY) {
                    stepper.interpolate(0.5, probe);
                    way = wayOut(probe);
                    part = 0.5;
                }
                steps++;
                if (settings.turnLimit() < Double.POSITIVE_INFINITY) {
                    double until = way == NO_WAY ? 1 : earliestExit(part);
                    if (beyondTurns(release, until) >= 0) {
                        return stopTurning(release, until, observer);
                    }
                }
                if (way == NO_WAY) {
                    if (observer != null) {
                        observer.step(new KeptStep(time, h, 1));
                    }
                    System.arraycopy(stepper.endState(), 0, y, 0, 3);
                    time += h;
                    if (time >= settings.timeLimit() * (1 - 1e-14)) {
                        return new PathEnd.StillInside(time, position());
                    }
                    stepper.accept();
                    h *= control.afterAccepted(error);
                    continue;
                }
                double fraction = earliestExit(part);
                way = lastWay;
                if (observer != null) {
                    observer.step(new KeptStep(time, h, fraction));
                }
                stepper.interpolate(fraction, y);
                time += fraction * h;
                h *= control.afterAccepted(error);
                PathEnd end = pass(way);
                if (end != null) {
                    return end;
                }
                break;
            }
        }
        return failed("it passed " + MOST_PIECES + " pieces of the film without leaving it");
    }

    // ---- the state and where it is ---------------------------------------------------------------------------------

    private boolean place(Release release) {
        time = 0;
        y[0] = release.theta();
        y[1] = release.radius();
        y[2] = release.sigma();
        sectorsPassed = 0;
        if (!(y[1] >= grid.innerRadius()
                && y[1] <= grid.outerRadius()
                && y[2] >= 0
                && y[2] <= 1
                && Math.abs(y[0]) < 1e9)) {
            return false;
        }
        j = grid.row(y[1]);
        sectorsPassed = grid.intoSector(y[0], j, y[1]);
        i = grid.column(steadyTheta(0, y[0]) - sectorsPassed * pitch, j, y[1]);
        k = 0;
        while (k < flow.layers() - 1 && flow.level(k + 1) <= y[2]) {
            k++;
        }
        return true;
    }

    /** Angle in the frame in which the film is steady, unwrapped (rad), at a time since the release. */
    private double steadyTheta(double since, double theta) {
        return theta - steadyTurn * settings.direction().sign() * since;
    }

    private void evaluate(double since, double[] state, double[] dydt) {
        double theta = steadyTheta(since, state[0]) - sectorsPassed * pitch;
        flow.rates(i, j, k, theta, state[1], state[2], rates);
        int sign = settings.direction().sign();
        dydt[0] = sign * (rates[0] + steadyTurn);
        dydt[1] = sign * rates[1];
        dydt[2] = sign * rates[2];
    }

    /** Time to cross the piece at the present rates (s). */
    private double crossingTime(double[] rate) {
        int sign = settings.direction().sign();
        double dr = grid.radius(j + 1) - grid.radius(j);
        double width = grid.lineTheta(i + 1, j, y[1]) - grid.lineTheta(i, j, y[1]);
        double around = Math.abs(rate[0] - sign * steadyTurn - grid.lineSlope(i, j) * rate[1]) / width;
        double out = Math.abs(rate[1]) / dr;
        double across = Math.abs(rate[2]) / (flow.level(k + 1) - flow.level(k));
        return 1 / Math.max(around, Math.max(out, across));
    }

    private double errorNorm() {
        double[] error = stepper.error();
        double scale = settings.tolerance();
        double around = Math.abs(error[0]) * y[1] / (scale * extent);
        double out = Math.abs(error[1]) / (scale * extent);
        double across = Math.abs(error[2]) / scale;
        double[] end = stepper.endState();
        double sum = around + out + across + Math.abs(end[0]) + Math.abs(end[1]) + Math.abs(end[2]);
        if (Double.isNaN(sum) || Double.isInfinite(sum)) {
            return Double.POSITIVE_INFINITY;
        }
        return Math.max(around, Math.max(out, across));
    }

    // ---- the limit of turns ----------------------------------------------------------------------------------------

    /** How far beyond the limit of turns a point of the tried step lies (rad). */
    private double beyondTurns(Release release, double fraction) {
        stepper.interpolate(fraction, probe);
        double since = time + fraction * stepper.step();
        double stationary = probe[0] + stationaryTurn * settings.direction().sign() * since;
        return Math.abs(stationary - release.theta()) - settings.turnLimit();
    }

    private PathEnd stopTurning(Release release, double until, StepObserver observer) {
        double fraction =
                beyondTurns(release, 0) >= 0 ? 0 : rootFinder.solve(200, f -> beyondTurns(release, f), 0, until);
        if (observer != null) {
            observer.step(new KeptStep(time, stepper.step(), fraction));
        }
        stepper.interpolate(fraction, y);
        time += fraction * stepper.step();
        return new PathEnd.StillInside(time, position());
    }

    // ---- the borders of a piece ------------------------------------------------------------------------------------

    private static final int NO_WAY = -1;
    private static final int BACK_AROUND = 0;
    private static final int ON_AROUND = 1;
    private static final int INWARD = 2;
    private static final int OUTWARD = 3;
    private static final int DOWN = 4;
    private static final int UP = 5;

    private int lastWay;
    private double stepTimeAt;

    /** How far inside the border of one way out a state is, as a fraction of the piece; negative beyond it. */
    private double inside(int way, double fraction, double[] state) {
        switch (way) {
            case BACK_AROUND:
            case ON_AROUND: {
                double theta = steadyTheta(time + fraction * stepTimeAt, state[0]) - sectorsPassed * pitch;
                double left = grid.lineTheta(i, j, state[1]);
                double width = grid.lineTheta(i + 1, j, state[1]) - left;
                double a = (theta - left) / width;
                return way == BACK_AROUND ? a : 1 - a;
            }
            case INWARD:
                return (state[1] - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
            case OUTWARD:
                return (grid.radius(j + 1) - state[1]) / (grid.radius(j + 1) - grid.radius(j));
            case DOWN:
                return (state[2] - flow.level(k)) / (flow.level(k + 1) - flow.level(k));
            default:
                return (flow.level(k + 1) - state[2]) / (flow.level(k + 1) - flow.level(k));
        }
    }

    private boolean sealed(int way) {
        boolean feeds = flow.film().feeds(grid.cell(i, j));
        return (way == DOWN && k == 0 && !(openRotor && feeds))
                || (way == UP && k == flow.layers() - 1 && !(openStator && feeds));
    }

    private boolean throughSealedFace(double[] state) {
        return (state[2] < -SEALED_EDGE && sealed(DOWN)) || (state[2] > 1 + SEALED_EDGE && sealed(UP));
    }

    /** Some way out by which a state within the tried step has left its piece, or NO_WAY. */
    private int wayOut(double[] state) {
        double fraction = state == probe ? 0.5 : 1;
        stepTimeAt = stepper.step();
        for (int way = BACK_AROUND; way <= UP; way++) {
            if (inside(way, fraction, state) < -EDGE && !sealed(way)) {
                return way;
            }
        }
        return NO_WAY;
    }

    /**
     * The fraction of the tried step at which the path first leaves its piece; sets lastWay. By the end of the step it may
     * be back within a border that it passed before another, so the exit found is searched for earlier ones.
     */
    private double earliestExit(double until) {
        double earliest = exitBeyond(until);
        for (int again = BACK_AROUND; again <= UP; again++) {
            if (!beyondAnother(earliest)) {
                break;
            }
            int way = lastWay;
            double earlier = exitBeyond(earliest);
            if (lastWay == NO_WAY || earlier >= earliest) {
                lastWay = way;
                break;
            }
            earliest = earlier;
        }
        return earliest;
    }

    /** Whether a point of the tried step also lies beyond another border than the one it is to leave by. */
    private boolean beyondAnother(double fraction) {
        stepper.interpolate(fraction, probe);
        for (int way = BACK_AROUND; way <= UP; way++) {
            if (way != lastWay && inside(way, fraction, probe) < -EDGE && !sealed(way)) {
                return true;
            }
        }
        return false;
    }

    /** The earliest exit by those ways by which a point of the tried step is outside; sets lastWay. */
    private double exitBeyond(double until) {
        double earliest = until;
        stepTimeAt = stepper.step();
        lastWay = NO_WAY;
        for (int way = BACK_AROUND; way <= UP; way++) {
            if (sealed(way)) {
                continue;
            }
            final int border = way;
            if (beyond(border, until) >= 0) {
                continue;
            }
            double root;
            if (beyond(border, 0) <= 0) {
                root = 0;
            } else {
                root = rootFinder.solve(200, f -> beyond(border, f), 0, until);
            }
            if (lastWay == NO_WAY || root < earliest) {
                earliest = root;
                lastWay = way;
            }
        }
        return earliest;
    }

    private double beyond(int way, double fraction) {
        stepper.interpolate(fraction, probe);
        return inside(way, fraction, probe) + EDGE;
    }

    /** Moves over a border of the piece; the end of the path where that is a border of the film, else null. */
    private PathEnd pass(int way) {
        switch (way) {
            case INWARD:
                y[1] = grid.radius(j);
                if (j == 0) {
                    return new PathEnd.Left(PathEnd.Border.INNER, time, position());
                }
                j--;
                break;
            case OUTWARD:
                y[1] = grid.radius(j + 1);
                if (j == grid.cellsRadial() - 1) {
                    return new PathEnd.Left(PathEnd.Border.OUTER, time, position());
                }
                j++;
                break;
            case DOWN:
                y[2] = flow.level(k);
                if (k == 0) {
                    return new PathEnd.Left(PathEnd.Border.SUPPLY, time, position());
                }
                k--;
                break;
            case UP:
                y[2] = flow.level(k + 1);
                if (k == flow.layers() - 1) {
                    return new PathEnd.Left(PathEnd.Border.SUPPLY, time, position());
                }
                k++;
                break;
            case BACK_AROUND:
                snap(i);
                if (--i < 0) {
                    i = grid.cellsTheta() - 1;
                    sectorsPassed--;
                }
                break;
            default:
                snap(i + 1);
                if (++i == grid.cellsTheta()) {
                    i = 0;
                    sectorsPassed++;
                }
                break;
        }
        y[2] = Math.max(0, Math.min(1, y[2]));
        return null;
    }

    /** Puts the state onto a grid line exactly. */
    private void snap(int line) {
        double theta = steadyTheta(time, y[0]) - sectorsPassed * pitch;
        y[0] += grid.lineTheta(line, j, y[1]) - theta;
    }

    // ---- what is told of a path ------------------------------------------------------------------------------------

    private PathEnd.Position position() {
        double stationary = y[0] + stationaryTurn * settings.direction().sign() * time;
        return new PathEnd.Position(y[0], stationary, y[1], y[2]);
    }

    private PathEnd failed(String reason) {
        return new PathEnd.Failed(time, position(), reason);
    }

    private PathPoint point(double since, double[] state) {
        return finder.point(since, state[0], state[1], state[2], i, j, k, sectorsPassed);
    }

    private final class KeptStep implements PathStep {
        private final double from;
        private final double length;
        private final double share;

        KeptStep(double from, double length, double share) {
            this.from = from;
            this.length = length;
            this.share = share;
        }

        @Override
        public double startTime() {
            return from;
        }

        @Override
        public double endTime() {
            return from + share * length;
        }

        @Override
        public PathPoint at(double fraction) {
            double[] state = new double[3];
            stepper.interpolate(fraction * share, state);
            return point(from + fraction * share * length, state);
        }

        @Override
        public void copy(double[] into, int at) {
            into[at] = from;
            into[at + 1] = length;
            into[at + 2] = share;
            into[at + 3] = i;
            into[at + 4] = j;
            into[at + 5] = k;
            into[at + 6] = sectorsPassed;
            stepper.extension(into, at + PointFinder.EXTENSION_AT);
        }
    }
}
