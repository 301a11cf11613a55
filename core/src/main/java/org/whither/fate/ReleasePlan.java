package org.whither.fate;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import org.apache.commons.math3.random.SobolSequenceGenerator;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;

/**
 * Releases over the part of a border where gas enters (or leaves) the film, spread so that each stands for the same mass
 * flow. A point of the unit square is carried onto the border so that equal areas become equal flows: its first
 * coordinate runs round the ring, its second along the column of cells (over a feed) or across the film (over a
 * diameter). The points of the square are Sobol's (I. M. Sobol, USSR Comput. Math. Math. Phys. 7(4), 1967), which are
 * stratified both ways, each replicate with a random digital shift of its own.
 */
public final class ReleasePlan {
    private static final double TWO_TO_52 = 0x1p52;
    private static final int BISECTIONS = 60;

    private final FilmFlow flow;
    private final PathEnd.Border border;
    private final int direction;
    private final double[] columnTotal;
    private final double[][] partTotal;

    private ReleasePlan(FilmFlow flow, PathEnd.Border border, boolean entering) {
        this.flow = flow;
        this.border = border;
        this.direction = entering ? 1 : -1;
        FilmGrid grid = flow.film().grid();
        int nci = grid.cellsTheta();
        columnTotal = new double[nci + 1];
        partTotal = new double[nci][];
        int parts = border == PathEnd.Border.SUPPLY ? grid.cellsRadial() : flow.profileParts();
        for (int i = 0; i < nci; i++) {
            double[] total = new double[parts + 1];
            for (int part = 0; part < parts; part++) {
                total[part + 1] = total[part] + Math.max(0, direction * into(i, part));
            }
            partTotal[i] = total;
            columnTotal[i + 1] = columnTotal[i] + total[parts];
        }
    }

    /**
     * A plan for the gas that enters the film over a border.
     *
     * @param flow the motion of the gas
     * @param border the border
     * @return the plan
     */
    public static ReleasePlan entering(FilmFlow flow, PathEnd.Border border) {
        return new ReleasePlan(flow, border, true);
    }

    /**
     * A plan for the gas that leaves the film over a border, to be followed back in time.
     *
     * @param flow the motion of the gas
     * @param border the border
     * @return the plan
     */
    public static ReleasePlan leaving(FilmFlow flow, PathEnd.Border border) {
        return new ReleasePlan(flow, border, false);
    }

    /** Mass flow into the film through part of a column of the border, of one sector (kg/s). */
    private double into(int i, int part) {
        if (border == PathEnd.Border.SUPPLY) {
            return flow.supplyFlow(i, part);
        }
        int j = border == PathEnd.Border.INNER ? 0 : flow.film().grid().nj() - 1;
        double outwards = flow.radialFlowBelow(i, j, flow.profilePart(part + 1))
                - flow.radialFlowBelow(i, j, flow.profilePart(part));
        return border == PathEnd.Border.INNER ? outwards : -outwards;
    }

    /** Mass flow of the whole ring over the part of the border that the plan covers (kg/s). */
    public double massFlow() {
        return columnTotal[columnTotal.length - 1] * flow.film().grid().sectors();
    }

    /**
     * Releases of one replicate.
     *
     * @param seed seed of its random shift
     * @param first index of the first point of the sequence
     * @param count how many; a power of two, with {@code first} a multiple of it, keeps the stratification whole
     * @return releases, each standing for {@code massFlow() / count}; none where nothing enters
     */
    public List<Release> releases(long seed, int first, int count) {
        List<Release> releases = new ArrayList<>(count);
        if (massFlow() <= 0) {
            return releases;
        }
        SplittableRandom random = new SplittableRandom(seed);
        long shiftU = random.nextLong() >>> 12;
        long shiftV = random.nextLong() >>> 12;
        SobolSequenceGenerator sobol = new SobolSequenceGenerator(2);
        double each = massFlow() / count;
        for (int n = first; n < first + count; n++) {
            double[] point = n == first ? sobol.skipTo(n) : sobol.nextVector();
            double u = shifted(point[0], shiftU);
            double v = shifted(point[1], shiftV);
            releases.add(at(u, v, each));
        }
        return releases;
    }

    private static double shifted(double coordinate, long shift) {
        return ((((long) (coordinate * TWO_TO_52)) ^ shift) + 0.5) / TWO_TO_52;
    }

    /**
     * The release at a point of the unit square.
     *
     * @param u share of the mass flow that enters at smaller angles of the sector, 0 … 1
     * @param v share of the flow of that column of cells that enters at a smaller radius (feed) or height (diameters),
     *     0 … 1
     * @param massFlow mass flow that the tracer is to stand for (kg/s)
     * @return the release
     * @throws IllegalStateException where nothing enters
     */
    public Release at(double u, double v, double massFlow) {
        if (massFlow() <= 0) {
            throw new IllegalStateException("no gas crosses the " + border + " border this way; expected some");
        }
        FilmGrid grid = flow.film().grid();
        double column = u * columnTotal[columnTotal.length - 1];
        int i = find(columnTotal, column);
        double a = (column - columnTotal[i]) / (columnTotal[i + 1] - columnTotal[i]);
        double[] total = partTotal[i];
        double within = v * total[total.length - 1];
        int part = find(total, within);
        double share = (within - total[part]) / (total[part + 1] - total[part]);
        if (border == PathEnd.Border.SUPPLY) {
            double r = grid.radius(part) + share * (grid.radius(part + 1) - grid.radius(part));
            double theta = (1 - a) * grid.lineTheta(i, part, r) + a * grid.lineTheta(i + 1, part, r);
            boolean stator = flow.film().supply().orElseThrow().face() == Face.STATOR;
            return new Release(theta, r, stator ? 1 : 0, massFlow);
        }
        int j = border == PathEnd.Border.INNER ? 0 : grid.nj() - 1;
        double theta = (1 - a) * grid.theta(i, j) + a * grid.theta(i + 1, j);
        return new Release(theta, grid.radius(j), height(i, j, part, share), massFlow);
    }

    /** The height below which a share of the flow of a part of the profile runs. */
    private double height(int i, int j, int part, double share) {
        double low = flow.profilePart(part);
        double high = flow.profilePart(part + 1);
        double start = flow.radialFlowBelow(i, j, low);
        double wanted = share * Math.abs(flow.radialFlowBelow(i, j, high) - start);
        for (int n = 0; n < BISECTIONS; n++) {
            double middle = 0.5 * (low + high);
            if (Math.abs(flow.radialFlowBelow(i, j, middle) - start) < wanted) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return 0.5 * (low + high);
    }

    /** The step of a rising staircase that holds a value; never a step of height 0. */
    private static int find(double[] total, double value) {
        int at = Arrays.binarySearch(total, value);
        int n = at >= 0 ? at : -at - 2;
        n = Math.max(0, Math.min(total.length - 2, n));
        while (n < total.length - 2 && total[n + 1] <= total[n]) {
            n++;
        }
        while (n > 0 && total[n + 1] <= total[n]) {
            n--;
        }
        return n;
    }
}
