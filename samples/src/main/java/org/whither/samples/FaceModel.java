package org.whither.samples;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.whither.samples.SealDescription.Pocket;
import org.whither.samples.SealDescription.Pockets;
import org.whither.samples.SealDescription.SpiralGrooves;

/** The faces of a seal on a grid: where the grid lines run, and how thick the film of each cell is. */
final class FaceModel {
    /** Size of the cells at an edge of a groove, over the mean of its segment. */
    private static final double REFINEMENT = 0.3;

    private final SealDescription seal;
    private final SheetGrid grid;
    private final double[] depth;
    private final double[] stator;
    private final boolean[] fedRow;

    /**
     * A model of a seal's faces.
     *
     * @param seal the seal
     * @param size how many cells to deal out
     * @throws IllegalArgumentException where the size has too few cells for the seal's edges
     */
    FaceModel(SealDescription seal, GridSize size) {
        this.seal = seal;
        List<Edge> across = new ArrayList<>();
        List<Edge> around = new ArrayList<>();
        double pitch = 2 * Math.PI / seal.sectors();
        across.add(new Edge(seal.innerRadius(), false));
        across.add(new Edge(seal.outerRadius(), false));
        across.add(new Edge(seal.feed().from(), false));
        across.add(new Edge(seal.feed().to(), false));
        around.add(new Edge(0, false));
        around.add(new Edge(pitch, false));
        if (seal.recesses().isPresent() && seal.recesses().get() instanceof SpiralGrooves grooves) {
            across.add(new Edge(grooves.from(), true));
            across.add(new Edge(grooves.to(), true));
            around.add(new Edge(0.5 * pitch * (1 - grooves.grooveShare()), true));
            around.add(new Edge(0.5 * pitch * (1 + grooves.grooveShare()), true));
        } else if (seal.recesses().isPresent() && seal.recesses().get() instanceof Pockets pockets) {
            for (Pocket pocket : pockets.pockets()) {
                across.add(new Edge(pocket.from(), true));
                across.add(new Edge(pocket.to(), true));
                for (double angle : new double[] {pocket.angleFrom(), pocket.angleTo()}) {
                    if (angle > 0) {
                        around.add(new Edge(0.5 * pitch - angle, true));
                        around.add(new Edge(0.5 * pitch + angle, true));
                    }
                }
            }
        }
        // the logarithm of the radius is the solver's coordinate
        List<Edge> logarithms = new ArrayList<>();
        for (Edge edge : across) {
            logarithms.add(new Edge(Math.log(edge.at() / seal.innerRadius()), edge.rough()));
        }
        double[] y = lines(logarithms, size.cellsRadial(), seal.name() + " along r");
        double[] xi = lines(around, size.cellsTheta(), seal.name() + " along θ");
        double[] radius = new double[y.length];
        double[] offset = new double[y.length];
        for (int j = 0; j < y.length; j++) {
            radius[j] = seal.innerRadius() * Math.exp(y[j]);
        }
        snap(radius, across);
        if (seal.recesses().isPresent() && seal.recesses().get() instanceof SpiralGrooves grooves) {
            for (int j = 0; j < y.length; j++) {
                double within = Math.max(grooves.from(), Math.min(grooves.to(), radius[j]));
                offset[j] = grooves.turn() * Math.log(within / grooves.from());
            }
        }
        this.grid = new SheetGrid(xi, radius, offset, seal.sectors());
        this.depth = new double[grid.cells()];
        this.stator = new double[grid.cells()];
        this.fedRow = new boolean[grid.nr()];
        for (int j = 0; j < grid.nr(); j++) {
            double r = grid.middleRadius(j);
            fedRow[j] = r > seal.feed().from() && r < seal.feed().to();
            double share = (r - seal.innerRadius()) / (seal.outerRadius() - seal.innerRadius());
            for (int i = 0; i < grid.nx(); i++) {
                double fromMiddle = Math.abs(0.5 * (xi[i] + xi[i + 1]) - 0.5 * pitch);
                depth[grid.cell(i, j)] = depthAt(r, fromMiddle, pitch);
                stator[grid.cell(i, j)] = seal.clearance() + share * seal.coning();
            }
        }
    }

    /** The solver's grid. */
    SheetGrid grid() {
        return grid;
    }

    /** Depth of the rotor face of a cell below its lands (m). */
    double depth(int cell) {
        return depth[cell];
    }

    /** Height of the stator face of a cell above the rotor's lands (m). */
    double stator(int cell) {
        return stator[cell];
    }

    /** Whether a row of cells lies in the feed. */
    boolean fed(int j) {
        return fedRow[j];
    }

    private double depthAt(double r, double fromMiddle, double pitch) {
        if (seal.recesses().isEmpty()) {
            return 0;
        }
        if (seal.recesses().get() instanceof SpiralGrooves grooves) {
            boolean within = r > grooves.from() && r < grooves.to() && fromMiddle < 0.5 * pitch * grooves.grooveShare();
            return within ? grooves.depth() : 0;
        }
        double deepest = 0;
        if (seal.recesses().get() instanceof Pockets pockets) {
            for (Pocket pocket : pockets.pockets()) {
                if (r > pocket.from()
                        && r < pocket.to()
                        && fromMiddle > pocket.angleFrom()
                        && fromMiddle < pocket.angleTo()) {
                    deepest = Math.max(deepest, pocket.depth());
                }
            }
        }
        return deepest;
    }

    /**
     * A place where a grid line must lie.
     *
     * @param at coordinate
     * @param rough whether the film thickness jumps there, so that the grid is to be refined
     */
    private record Edge(double at, boolean rough) {}

    /** Grid lines through all edges, the cells dealt out by length and refined towards the rough edges. */
    private static double[] lines(List<Edge> edges, int cells, String where) {
        List<Edge> sorted = new ArrayList<>();
        double span = edges.get(1).at() - edges.get(0).at();
        for (Edge edge :
                edges.stream().sorted((a, b) -> Double.compare(a.at(), b.at())).toList()) {
            Edge last = sorted.isEmpty() ? null : sorted.get(sorted.size() - 1);
            if (last != null && edge.at() - last.at() < 1e-9 * span) {
                sorted.set(sorted.size() - 1, new Edge(last.at(), last.rough() || edge.rough()));
            } else {
                sorted.add(edge);
            }
        }
        int segments = sorted.size() - 1;
        if (cells < segments) {
            throw new IllegalArgumentException(cells + " cells were asked for " + where + "; its edges need at least "
                    + segments + " cells there");
        }
        double[] length = new double[segments];
        for (int n = 0; n < segments; n++) {
            length[n] = sorted.get(n + 1).at() - sorted.get(n).at();
        }
        int[] counts = deal(cells, length);
        double[] lines = new double[cells + 1];
        int at = 0;
        for (int n = 0; n < segments; n++) {
            Edge from = sorted.get(n);
            Edge to = sorted.get(n + 1);
            for (int m = 0; m < counts[n]; m++) {
                double t = (double) m / counts[n];
                lines[at++] = from.at() + length[n] * refined(t, from.rough(), to.rough());
            }
        }
        lines[at] = sorted.get(segments).at();
        return lines;
    }

    /** Deals cells to segments by length, at least one each, the largest remainders first. */
    static int[] deal(int cells, double[] length) {
        double total = Arrays.stream(length).sum();
        int[] counts = new int[length.length];
        int left = cells;
        for (int n = 0; n < length.length; n++) {
            counts[n] = Math.max(1, (int) Math.floor(cells * length[n] / total + 1e-9));
            left -= counts[n];
        }
        while (left != 0) {
            int step = left > 0 ? 1 : -1;
            int best = -1;
            double most = Double.NEGATIVE_INFINITY;
            for (int n = 0; n < length.length; n++) {
                double need = step * (cells * length[n] / total - counts[n]);
                if ((step > 0 || counts[n] > 1) && need > most + 1e-9) {
                    most = need;
                    best = n;
                }
            }
            counts[best] += step;
            left -= step;
        }
        return counts;
    }

    /** A hyperbolic tangent that maps 0 … 1 to itself and is flat at the rough ends. */
    private static double refined(double t, boolean start, boolean end) {
        if (start && end) {
            return 0.5 + 0.5 * Math.tanh(STRETCH * (2 * t - 1)) / Math.tanh(STRETCH);
        }
        if (start) {
            return 1 - Math.tanh(STRETCH * (1 - t)) / Math.tanh(STRETCH);
        }
        return end ? Math.tanh(STRETCH * t) / Math.tanh(STRETCH) : t;
    }

    private static final double STRETCH = stretch();

    /** β with 2β/sinh 2β = REFINEMENT, by bisection. */
    private static double stretch() {
        double low = 1e-6;
        double high = 10;
        for (int n = 0; n < 100; n++) {
            double b = 0.5 * (low + high);
            if (2 * b / Math.sinh(2 * b) > REFINEMENT) {
                low = b;
            } else {
                high = b;
            }
        }
        return low;
    }

    /** Puts the rings that stand for edges at their very radii, free of the rounding of logarithms. */
    private static void snap(double[] radius, List<Edge> edges) {
        for (Edge edge : edges) {
            for (int j = 0; j < radius.length; j++) {
                if (Math.abs(radius[j] / edge.at() - 1) < 1e-12) {
                    radius[j] = edge.at();
                }
            }
        }
    }
}
