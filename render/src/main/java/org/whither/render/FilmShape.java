package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Supply;

/**
 * What the pictures need to know of a film's shape and pressure: outlines, bands, ranges, sampled values. Lengths in m.
 */
final class FilmShape {
    /** A step smaller than this share of the whole height range of the rotor face is no groove edge. */
    private static final double STEP_SHARE = 0.25;

    /** A rotor face whose height varies by less than this share of the least film thickness has no grooves. */
    private static final double GROOVE_SHARE = 0.1;

    /**
     * A straight piece of an outline in the (θ, r) plane of one sector.
     *
     * @param theta0 angle of its start (rad)
     * @param r0 radius of its start (m)
     * @param theta1 angle of its end (rad)
     * @param r1 radius of its end (m)
     */
    record Edge(double theta0, double r0, double theta1, double r1) {}

    /**
     * A ring of the face.
     *
     * @param from inner radius (m)
     * @param to outer radius (m)
     */
    record Band(double from, double to) {
        double width() {
            return to - from;
        }
    }

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final int middleLayer;
    private final double rotorLow;
    private final double rotorHigh;
    private final double statorLow;
    private final double statorHigh;
    private final double leastThickness;
    private final List<Edge> rotorEdges;
    private final List<Edge> grooveEdges;
    private final List<Band> grooveBands;
    private final Band dam;

    FilmShape(FilmFlow flow) {
        this.flow = flow;
        this.grid = flow.film().grid();
        int k = 0;
        while (k + 1 < flow.layers() && flow.level(k + 1) <= 0.5) {
            k++;
        }
        this.middleLayer = k;
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        double under = Double.POSITIVE_INFINITY;
        double over = Double.NEGATIVE_INFINITY;
        double thin = Double.POSITIVE_INFINITY;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    double z = cornerRotorZ(i, j, c);
                    low = Math.min(low, z);
                    high = Math.max(high, z);
                    double h = flow.thickness(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
                    thin = Math.min(thin, h);
                    under = Math.min(under, z + h);
                    over = Math.max(over, z + h);
                }
            }
        }
        this.rotorLow = low;
        this.rotorHigh = high;
        this.statorLow = under;
        this.statorHigh = over;
        this.leastThickness = thin;
        this.rotorEdges = List.copyOf(findEdges(flow::rotorZ, rotorLow, rotorHigh));
        this.grooveEdges = List.copyOf(findGrooveEdges());
        this.grooveBands = !grooveEdges.isEmpty() ? List.copyOf(bands(true)) : List.of();
        this.dam = findDam();
    }

    FilmFlow flow() {
        return flow;
    }

    FilmGrid grid() {
        return grid;
    }

    /** Lowest point of the rotor face, the deepest groove floor (m). */
    double rotorLow() {
        return rotorLow;
    }

    /** Highest point of the rotor face (m). */
    double rotorHigh() {
        return rotorHigh;
    }

    /** Least film thickness (m). */
    double leastThickness() {
        return leastThickness;
    }

    /** Angle of corner c of cell (i, j); corners run (i, j), (i + 1, j), (i + 1, j + 1), (i, j + 1). */
    double cornerTheta(int i, int j, int c) {
        return grid.theta(i + (c == 1 || c == 2 ? 1 : 0), j + (c >= 2 ? 1 : 0));
    }

    double cornerRadius(int j, int c) {
        return grid.radius(j + (c >= 2 ? 1 : 0));
    }

    private double cornerRotorZ(int i, int j, int c) {
        return flow.rotorZ(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
    }

    /** Pressure at mid film at a point of cell (i, j) (Pa). */
    double pressure(int i, int j, double theta, double r) {
        return flow.pressure(i, j, middleLayer, theta, r, 0.5);
    }

    /** Lowest and highest pressure at mid film at the corners of the cells (Pa). */
    PictureSettings.Range pressureRange() {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    double p = pressure(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
                    low = Math.min(low, p);
                    high = Math.max(high, p);
                }
            }
        }
        return high > low ? new PictureSettings.Range(low, high) : new PictureSettings.Range(low - 0.5e5, high + 0.5e5);
    }

    /** Pressure at the nodes, mean of the cells that meet there, the seam included; ni × nj (Pa). */
    double[] nodePressures() {
        double[] sum = new double[grid.nodes()];
        int[] count = new int[grid.nodes()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    int n = grid.node(i + (c == 1 || c == 2 ? 1 : 0), j + (c >= 2 ? 1 : 0));
                    sum[n] += pressure(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
                    count[n]++;
                }
            }
        }
        for (int j = 0; j < grid.nj(); j++) {
            int first = grid.node(0, j);
            int last = grid.node(grid.ni() - 1, j);
            double mean = (sum[first] + sum[last]) / (count[first] + count[last]);
            sum[first] = mean;
            sum[last] = mean;
            count[first] = 1;
            count[last] = 1;
        }
        for (int n = 0; n < sum.length; n++) {
            sum[n] /= count[n];
        }
        return sum;
    }

    /** Whether a face has grooves at all. */
    boolean grooved() {
        return !grooveEdges().isEmpty();
    }

    /**
     * Outlines of the grooves of both faces in one sector: where the height of a face jumps between neighbouring cells, and,
     * where it is continuous but steep, the line at half height.
     */
    List<Edge> grooveEdges() {
        return grooveEdges;
    }

    /** What the grooves lie in, as a name for them. */
    String groovedFaces() {
        boolean rotor = rotorHigh - rotorLow > GROOVE_SHARE * leastThickness;
        boolean stator = statorHigh - statorLow > GROOVE_SHARE * leastThickness;
        return rotor && stator ? "grooves, in both faces" : stator ? "grooves, in the stator" : "grooves, in the rotor";
    }

    /** Whether the rotor face has grooves. */
    boolean rotorGrooved() {
        return !rotorEdges.isEmpty();
    }

    /** As {@link #grooveEdges}, of the rotor face alone. */
    List<Edge> rotorEdges() {
        return rotorEdges;
    }

    private List<Edge> findGrooveEdges() {
        List<Edge> edges = new ArrayList<>(rotorEdges);
        edges.addAll(findEdges(this::statorZ, statorLow, statorHigh));
        return edges;
    }

    private double statorZ(int i, int j, double theta, double r) {
        return flow.rotorZ(i, j, theta, r) + flow.thickness(i, j, theta, r);
    }

    /** Height of a face at a point of a cell (m). */
    private interface FaceHeight {
        double at(int i, int j, double theta, double r);
    }

    private List<Edge> findEdges(FaceHeight face, double low, double high) {
        List<Edge> edges = new ArrayList<>();
        double range = high - low;
        if (range <= GROOVE_SHARE * leastThickness) {
            return edges;
        }
        double step = STEP_SHARE * range;
        int columns = grid.cellsTheta();
        for (int i = 0; i < columns; i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                if (jumpAcrossLine(face, i, j) > step) {
                    edges.add(new Edge(grid.theta(i, j), grid.radius(j), grid.theta(i, j + 1), grid.radius(j + 1)));
                }
                if (j > 0 && jumpAcrossRing(face, i, j) > step) {
                    edges.add(new Edge(grid.theta(i, j), grid.radius(j), grid.theta(i + 1, j), grid.radius(j)));
                }
                steepEdge(face, 0.5 * (low + high), i, j, step, edges);
            }
        }
        return edges;
    }

    /** Jump of a face over grid line i, in row j, at the middle of the row; line 0 is the seam (m). */
    private double jumpAcrossLine(FaceHeight face, int i, int j) {
        double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
        int before = i == 0 ? grid.cellsTheta() - 1 : i - 1;
        double beforeTheta = grid.lineTheta(before + 1, j, r);
        return Math.abs(face.at(before, j, beforeTheta, r) - face.at(i, j, grid.lineTheta(i, j, r), r));
    }

    /** Jump of a face over ring j of nodes, at the middle of column i (m). */
    private double jumpAcrossRing(FaceHeight face, int i, int j) {
        double r = grid.radius(j);
        double theta = 0.5 * (grid.theta(i, j) + grid.theta(i + 1, j));
        return Math.abs(face.at(i, j - 1, theta, r) - face.at(i, j, theta, r));
    }

    private void steepEdge(FaceHeight face, double half, int i, int j, double step, List<Edge> edges) {
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (int c = 0; c < 4; c++) {
            double z = face.at(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
            low = Math.min(low, z);
            high = Math.max(high, z);
        }
        if (high - low <= step || half <= low || half >= high) {
            return;
        }
        List<double[]> crossings = new ArrayList<>();
        for (int c = 0; c < 4; c++) {
            int d = (c + 1) % 4;
            double za = face.at(i, j, cornerTheta(i, j, c), cornerRadius(j, c)) - half;
            double zb = face.at(i, j, cornerTheta(i, j, d), cornerRadius(j, d)) - half;
            if (za < 0 != zb < 0) {
                double f = za / (za - zb);
                double ta = cornerTheta(i, j, c);
                double ra = cornerRadius(j, c);
                crossings.add(new double[] {ta + f * (cornerTheta(i, j, d) - ta), ra + f * (cornerRadius(j, d) - ra)});
            }
        }
        for (int n = 0; n + 1 < crossings.size(); n += 2) {
            double[] a = crossings.get(n);
            double[] b = crossings.get(n + 1);
            edges.add(new Edge(a[0], a[1], b[0], b[1]));
        }
    }

    /** The rings of the face that grooves cross (true) or not, as bands from the inner to the outer diameter. */
    private List<Band> bands(boolean wanted) {
        List<Band> bands = new ArrayList<>();
        List<Edge> edges = grooveEdges();
        boolean[] crossed = new boolean[grid.cellsRadial()];
        for (Edge edge : edges) {
            if (edge.r0() != edge.r1()) {
                crossed[grid.row(0.5 * (edge.r0() + edge.r1()))] = true;
            }
        }
        int start = -1;
        for (int j = 0; j <= crossed.length; j++) {
            boolean in = j < crossed.length && crossed[j] == wanted;
            if (in && start < 0) {
                start = j;
            } else if (!in && start >= 0) {
                bands.add(new Band(grid.radius(start), grid.radius(j)));
                start = -1;
            }
        }
        return bands;
    }

    /** The bands in which grooves lie; empty for a face without grooves. */
    List<Band> grooveBands() {
        return grooveBands;
    }

    /** The rings of a grooved face that no groove crosses, from the inner to the outer diameter; else empty. */
    List<Band> ungrooved() {
        return grooved() ? bands(false) : List.of();
    }

    /**
     * The dam: of the rings without grooves the one at which the grooves end and towards which they raise the pressure,
     * that is, the one nearest to the highest pressure; null where the face has no grooves or they cross all of it.
     */
    Band dam() {
        return dam;
    }

    private Band findDam() {
        double peak = pressurePeak();
        Band nearest = null;
        double least = Double.POSITIVE_INFINITY;
        for (Band band : ungrooved()) {
            double away = Math.max(0, Math.max(band.from() - peak, peak - band.to()));
            if (away < least) {
                least = away;
                nearest = band;
            }
        }
        return nearest;
    }

    /** Radius of the highest pressure at mid film, of the corners of the cells (m). */
    private double pressurePeak() {
        double most = Double.NEGATIVE_INFINITY;
        double peak = grid.innerRadius();
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    double p = pressure(i, j, cornerTheta(i, j, c), cornerRadius(j, c));
                    if (p > most) {
                        most = p;
                        peak = cornerRadius(j, c);
                    }
                }
            }
        }
        return peak;
    }

    /** The radii between which the feed lies, or null where there is no feed. */
    Band feed() {
        if (flow.film().supply().isEmpty()) {
            return null;
        }
        Supply supply = flow.film().supply().get();
        if (supply.annulus().isPresent()) {
            return new Band(
                    supply.annulus().get().from(), supply.annulus().get().to());
        }
        double from = Double.POSITIVE_INFINITY;
        double to = Double.NEGATIVE_INFINITY;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                if (supply.feeds(grid.cell(i, j))) {
                    from = Math.min(from, grid.radius(j));
                    to = Math.max(to, grid.radius(j + 1));
                }
            }
        }
        return to > from ? new Band(from, to) : null;
    }

    /** Outlines of a feed that is not an annulus, in one sector; empty for an annulus. */
    List<Edge> feedEdges() {
        List<Edge> edges = new ArrayList<>();
        if (flow.film().supply().isEmpty()
                || flow.film().supply().get().annulus().isPresent()) {
            return edges;
        }
        Supply supply = flow.film().supply().get();
        for (int i = 0; i < grid.cellsTheta(); i++) {
            int before = i == 0 ? grid.cellsTheta() - 1 : i - 1;
            for (int j = 0; j < grid.cellsRadial(); j++) {
                boolean here = supply.feeds(grid.cell(i, j));
                if (here != supply.feeds(grid.cell(before, j))) {
                    edges.add(new Edge(grid.theta(i, j), grid.radius(j), grid.theta(i, j + 1), grid.radius(j + 1)));
                }
                if (here != (j > 0 && supply.feeds(grid.cell(i, j - 1)))) {
                    edges.add(new Edge(grid.theta(i, j), grid.radius(j), grid.theta(i + 1, j), grid.radius(j)));
                }
                if (here && j + 1 == grid.cellsRadial()) {
                    edges.add(new Edge(
                            grid.theta(i, j + 1), grid.radius(j + 1), grid.theta(i + 1, j + 1), grid.radius(j + 1)));
                }
            }
        }
        return edges;
    }
}
