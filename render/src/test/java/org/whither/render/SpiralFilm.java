package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.fate.FedPoint;
import org.whither.film.Conditions;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.RingFaces;
import org.whither.film.Supply;
import org.whither.trace.Path;
import org.whither.trace.PathEnd;
import org.whither.trace.PathPoint;
import org.whither.trace.Release;

/**
 * An invented film for tests of the pictures: twelve spiral grooves in the rotor outside a dam, an annular feed in the
 * stator over the dam. Its pressure is a made-up smooth function, not the solution of a film equation; its rates follow
 * from that pressure by the lubrication approximation, without the rate across the film.
 */
final class SpiralFilm implements FilmFlow {
    static final double INNER = 0.050;
    static final double OUTER = 0.068;
    static final double TIP = 0.0615;
    static final double LAND = 3e-6;
    static final double DEPTH = 5e-6;
    /** Height of the rotor's lands: far from zero, as in a file whose origin lies elsewhere. */
    static final double DATUM = 0.25;

    static final double FEED_FROM = 0.0592;
    static final double FEED_TO = 0.0600;

    private final FilmGrid grid;
    private Film film;
    private final boolean stepped;
    private final double groovedShare = 0.5;

    /** With grooves inside a dam, and a wider ring without grooves inside of them. */
    static SpiralFilm groovedInside() {
        return new SpiralFilm(12, 12000 * Math.PI / 30, true, Face.STATOR, 1, 0.0580, TIP);
    }

    SpiralFilm() {
        this(12, 12000 * Math.PI / 30, true, Face.STATOR);
    }

    SpiralFilm(int sectors, double rotationRate, boolean stepped, Face feedFace) {
        this(sectors, rotationRate, stepped, feedFace, 1);
    }

    /** With names as long as somebody may give them. */
    static SpiralFilm withLongNames() {
        SpiralFilm film = new SpiralFilm();
        Film f = film.film;
        Conditions c = f.conditions();
        film.film = new Film(
                f.heading(),
                new Conditions(
                        c.rotationRate(),
                        c.pressureInner(),
                        c.pressureOuter(),
                        c.pressureSupply(),
                        c.temperature(),
                        "vent to the separation chamber and the bearing housing",
                        "process gas, a wet mixture of light hydrocarbons and hydrogen"),
                new Gas("nitrogen of industrial purity with traces of everything else", 0.0280134, 1.78e-5, 1),
                f.grid(),
                f.faces(),
                f.velocityFrame(),
                f.steadyIn(),
                f.field(),
                f.supply());
        return film;
    }

    /** As above, on a grid that is so many times finer both ways. */
    SpiralFilm(int sectors, double rotationRate, boolean stepped, Face feedFace, int finer) {
        this(sectors, rotationRate, stepped, feedFace, finer, TIP, OUTER);
    }

    private SpiralFilm(
            int sectors,
            double rotationRate,
            boolean stepped,
            Face feedFace,
            int finer,
            double grooveFrom,
            double grooveTo) {
        this.stepped = stepped;
        double[] radius = radii(finer);
        int ni = 24 * finer + 1;
        int nj = radius.length;
        double pitch = 2 * Math.PI / sectors;
        double[] theta = new double[ni * nj];
        for (int i = 0; i < ni; i++) {
            for (int j = 0; j < nj; j++) {
                theta[i * nj + j] = pitch * i / (ni - 1) + lean(radius[j]);
            }
        }
        this.grid = new FilmGrid(radius, theta, sectors);
        int size = stepped ? grid.cells() : grid.nodes();
        double[] rotor = new double[size];
        double[] stator = new double[size];
        for (int n = 0; n < size; n++) {
            int rows = stepped ? nj - 1 : nj;
            int i = n / rows;
            int j = n % rows;
            double r = stepped ? 0.5 * (radius[j] + radius[j + 1]) : radius[j];
            double at = (stepped ? i + 0.5 : i % (ni - 1)) / (ni - 1);
            rotor[n] = DATUM - (r > grooveFrom && r <= grooveTo && at < groovedShare ? DEPTH : 0);
            stator[n] = DATUM + LAND;
        }
        RingFaces faces = new RingFaces(stepped ? Location.CELL : Location.NODE, rotor, stator);
        Supply supply = Supply.ofAnnulus(grid, feedFace, new Supply.Annulus(FEED_FROM, FEED_TO), null);
        double[] pressure = new double[grid.cells()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r = 0.5 * (radius[j] + radius[j + 1]);
                pressure[grid.cell(i, j)] =
                        pressureAt(0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r)), r);
            }
        }
        this.film = new Film(
                new Film.Heading("Invented spiral-groove face", "a formula in a test", ""),
                new Conditions(rotationRate, 101325, 7e5, OptionalDouble.of(11e5), 300, "atmosphere", "process"),
                new Gas("nitrogen", 0.0280134, 1.78e-5, 1),
                grid,
                faces,
                Frame.ROTATING,
                Frame.ROTATING,
                new LubricationField(Location.CELL, pressure, null),
                Optional.of(supply));
    }

    private static double[] radii(int finer) {
        List<Double> radii = new ArrayList<>();
        double[] ends = {INNER, FEED_FROM, FEED_TO, TIP, OUTER};
        int[] parts = {20, 4, 5, 18};
        radii.add(INNER);
        for (int n = 0; n < parts.length; n++) {
            for (int m = 1; m <= parts[n] * finer; m++) {
                radii.add(ends[n] + (ends[n + 1] - ends[n]) * m / (parts[n] * finer));
            }
        }
        return radii.stream().mapToDouble(Double::doubleValue).toArray();
    }

    /** The grid lines are logarithmic spirals outside the groove ends, at 20° to the circle, and radial inside. */
    static double lean(double r) {
        return -Math.log(Math.max(r, TIP) / TIP) / Math.tan(Math.toRadians(20));
    }

    private double pressureAt(double theta, double r) {
        double feed = 0.5 * (FEED_FROM + FEED_TO);
        double inside = Math.max(0, Math.min(1, (r - INNER) / (feed - INNER)));
        double outside = Math.max(0, Math.min(1, (r - feed) / (OUTER - feed)));
        double squared =
                r < feed ? 101325.0 * 101325 + inside * (1e12 - 101325.0 * 101325) : 1e12 + outside * (0.49e12 - 1e12);
        double phase = grid.sectors() * (theta - lean(r)) - 2 * Math.PI * 0.46;
        double ridge = Math.exp(-Math.pow((r - TIP) / 0.0022, 2)) * (0.5 + 0.5 * Math.cos(phase));
        return Math.sqrt(squared) + 2.4e5 * ridge;
    }

    @Override
    public Film film() {
        return film;
    }

    @Override
    public int layers() {
        return 1;
    }

    @Override
    public double level(int k) {
        return k;
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] rates) {
        double h = thickness(i, j, theta, r);
        double dr = 1e-6;
        double dt = 1e-5;
        double pr = (pressureAt(theta, r + dr) - pressureAt(theta, r - dr)) / (2 * dr);
        double pt = (pressureAt(theta + dt, r) - pressureAt(theta - dt, r)) / (2 * dt);
        double shape = h * h / (2 * film.gas().viscosity()) * sigma * (1 - sigma);
        rates[0] = -film.conditions().rotationRate() * sigma - shape * pt / (r * r);
        rates[1] = -shape * pr;
        rates[2] = 0;
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return pressureAt(theta, r);
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return film.gas().density(pressureAt(theta, r), film.conditions().temperature());
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        if (stepped) {
            return film.faces().rotorZ(grid.cell(i, j));
        }
        double b = (r - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
        double from = grid.lineTheta(i, j, r);
        double a = (theta - from) / (grid.lineTheta(i + 1, j, r) - from);
        RingFaces faces = film.faces();
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return (1 - a) * ((1 - b) * faces.rotorZ(n) + b * faces.rotorZ(n + 1))
                + a * ((1 - b) * faces.rotorZ(m) + b * faces.rotorZ(m + 1));
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return DATUM + LAND - rotorZ(i, j, theta, r);
    }

    @Override
    public double supplyFlow(int i, int j) {
        return film.feeds(grid.cell(i, j)) ? 1e-7 : 0;
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        return 0;
    }

    @Override
    public String interpolation() {
        return "analytic";
    }

    /** Follows a tracer by steps of fixed length along the face; good enough to be looked at. */
    Path path(double theta, double radius, double sigma, Frame frame) {
        List<PathPoint> points = new ArrayList<>();
        double[] rates = new double[3];
        double rotation = film.conditions().rotationRate();
        double t = 0;
        double r = radius;
        double steady = theta;
        for (int n = 0; n < 20000; n++) {
            int j = grid.row(r);
            double within = steady - grid.intoSector(steady, j, r) * grid.pitch();
            int i = grid.column(within, j, r);
            rates(i, j, 0, within, r, sigma, rates);
            double seen = frame == Frame.ROTATING ? 0 : rotation;
            double speed = Math.hypot(rates[1], r * (rates[0] + seen));
            double z = rotorZ(i, j, within, r) + sigma * thickness(i, j, within, r);
            points.add(new PathPoint(t, steady + seen * t, steady, r, z, sigma, speed, pressureAt(within, r)));
            if (r <= INNER || r >= OUTER || t > 2e-2) {
                break;
            }
            double step = 1e-4 / Math.max(1e-3, Math.hypot(rates[1], r * rates[0]));
            steady += step * rates[0];
            r = Math.max(INNER, Math.min(OUTER, r + step * rates[1]));
            t += step;
        }
        PathEnd.Position position = new PathEnd.Position(steady, steady + rotation * t, r, sigma);
        PathEnd end = r <= INNER
                ? new PathEnd.Left(PathEnd.Border.INNER, t, position)
                : r >= OUTER
                        ? new PathEnd.Left(PathEnd.Border.OUTER, t, position)
                        : new PathEnd.StillInside(t, position);
        return new Path(new Release(theta, radius, sigma, 1e-6), points, end);
    }

    /** A few paths from the feed. */
    List<Path> paths(Frame frame) {
        List<Path> paths = new ArrayList<>();
        double[] sigma = {0.28, 0.55, 0.75, 0.4};
        for (int n = 0; n < 8; n++) {
            double r =
                    FEED_FROM + (FEED_TO - FEED_FROM) * (0.1 + 0.8 * (n % 2 == 0 ? 0.05 + 0.02 * n : 0.8 + 0.02 * n));
            paths.add(path(grid.pitch() * (n + 0.5) / 8, r, sigma[n % 4], frame));
        }
        return paths;
    }

    /** Points spread over the feed of one sector; where they go is made up, so that all destinations appear. */
    List<FedPoint> fed(int along, int across) {
        List<FedPoint> points = new ArrayList<>();
        for (int a = 0; a < along; a++) {
            for (int b = 0; b < across; b++) {
                double theta = grid.pitch() * (a + 0.5) / along;
                double r = FEED_FROM + (FEED_TO - FEED_FROM) * (b + 0.5) / across;
                double u = (a + 0.5) / along;
                double v = (b + 0.5) / across;
                double border = 0.55 + 0.22 * Math.sin(2 * Math.PI * u);
                PathEnd.Position position = new PathEnd.Position(theta, theta, r, 1);
                PathEnd end;
                if (Math.hypot(3 * (u - 0.75), v - 0.62) < 0.2) {
                    end = new PathEnd.Left(PathEnd.Border.SUPPLY, 1e-4, position);
                } else if (Math.hypot(3 * (u - 0.3), v - 0.78) < 0.12) {
                    end = new PathEnd.StillInside(1e-2, position);
                } else {
                    end = new PathEnd.Left(v > border ? PathEnd.Border.OUTER : PathEnd.Border.INNER, 1e-3, position);
                }
                points.add(new FedPoint(new Release(theta, r, 1, 1e-8), end));
            }
        }
        return points;
    }
}
