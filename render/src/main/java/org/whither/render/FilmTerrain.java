package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmGrid;

/** The film between the two faces, its thickness drawn too large: the whole ring. */
final class FilmTerrain implements Terrain {
    /** Lines across the stator face. */
    static final int MARKS = 36;

    /** Height of the eye in the film above the lands, as a share of the film thickness there. */
    private static final double EYE = 0.6;

    private final GapScene scene;
    private final FilmGrid grid;
    private final boolean covered;
    private final List<Scene.Item> rotor = new ArrayList<>();
    private final List<Scene.Item> stator = new ArrayList<>();
    private final List<Scene.Item> fixed = new ArrayList<>();
    private final double[] land;
    private final double[] roof;

    /**
     * The ring.
     *
     * @param covered whether the stator lies over all of the rotor, for an eye inside the film, or only a part of it is
     *     left standing, for an eye above
     * @param standing middle of the part left standing (rad)
     */
    FilmTerrain(FilmShape shape, double exaggeration, boolean covered, double standing) {
        this.grid = shape.grid();
        this.covered = covered;
        double half = Math.toRadians(32);
        this.scene = GapScene.ring(shape, exaggeration, standing - half, standing + half);
        repeat(scene.rotorSector(), rotor);
        if (covered) {
            repeat(scene.statorSector(), stator);
            fixed.add(scene.statorMarks(MARKS).shadowless());
        } else {
            fixed.addAll(scene.standingStator());
            fixed.addAll(scene.feedBorders());
        }
        int rings = grid.nj();
        land = new double[rings];
        roof = new double[rings];
        for (int j = 0; j < rings; j++) {
            land[j] = Double.NEGATIVE_INFINITY;
            roof[j] = Double.POSITIVE_INFINITY;
            for (int row = Math.max(0, j - 2); row < Math.min(rings - 1, j + 2); row++) {
                for (int i = 0; i < grid.cellsTheta(); i++) {
                    for (int c = 0; c < 4; c++) {
                        double theta = shape.cornerTheta(i, row, c);
                        double r = shape.cornerRadius(row, c);
                        double z = shape.flow().rotorZ(i, row, theta, r);
                        land[j] = Math.max(land[j], z);
                        roof[j] = Math.min(roof[j], z + shape.flow().thickness(i, row, theta, r));
                    }
                }
            }
        }
    }

    private void repeat(List<Scene.Item> sector, List<Scene.Item> ring) {
        for (int n = 0; n < grid.sectors(); n++) {
            for (Scene.Item item : sector) {
                ring.add(item.turned(n * grid.pitch()));
            }
        }
    }

    @Override
    public double height(double steadyTheta, double radius, double z) {
        return scene.height(z);
    }

    @Override
    public List<Scene.Item> items(double filmTurn, double statorTurn, double[] eye) {
        List<Scene.Item> items = new ArrayList<>();
        Terrains.around(rotor, filmTurn, eye, 0.5 * grid.pitch(), items);
        Terrains.around(stator, filmTurn, eye, 0.5 * grid.pitch(), items);
        fixed.forEach(item -> items.add(item.turned(statorTurn)));
        return items;
    }

    @Override
    public boolean hidden(double[] place, double[] eye, double filmTurn) {
        double[] way = new double[3];
        double length = 0;
        for (int c = 0; c < 3; c++) {
            way[c] = eye[c] - place[c];
            length += way[c] * way[c];
        }
        length = Math.sqrt(length);
        double step = 0.004e3 * (grid.outerRadius() - grid.innerRadius());
        for (double s = 2 * step; s < length; s += step) {
            double x = place[0] + s * way[0] / length;
            double y = place[1] + s * way[1] / length;
            double z = place[2] + s * way[2] / length;
            double r = 1e-3 * Math.hypot(x, y);
            if (r < grid.innerRadius() || r > grid.outerRadius() || z > scene.top || z < scene.bottom) {
                continue;
            }
            double theta = Math.atan2(y, x) - filmTurn;
            if (z < scene.height(scene.rotorAt(theta, r)) || (covered && z > scene.height(scene.statorAt(theta, r)))) {
                return true;
            }
        }
        return false;
    }

    @Override
    public double eyeHeight(double steadyTheta, double radius, double gasHeight, double behind) {
        double r = Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), radius));
        int j = grid.row(r);
        double f = (r - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
        double low = scene.height(ShownPath.mix(land[j], land[j + 1], f));
        double high = scene.height(ShownPath.mix(roof[j], roof[j + 1], f));
        return low + EYE * (high - low);
    }

    @Override
    public double aimHeight(double gasHeight, double eyeHeight) {
        return ShownPath.mix(gasHeight, eyeHeight, 0.4);
    }

    @Override
    public double usualDistance() {
        return 0.7e3 * (grid.outerRadius() - grid.innerRadius());
    }

    @Override
    public double fieldOfView() {
        return Math.toRadians(48);
    }

    @Override
    public double tubeRadius() {
        return scene.tubeRadius();
    }

    @Override
    public Scene.Light light(double azimuth) {
        // Fixed to the ring: shadows do not wander as the eye turns.
        return Scene.Light.from(0.35, 0.3, 1.4);
    }

    @Override
    public String words() {
        double factor = scene.exaggeration;
        return factor == 1
                ? "Drawn true to scale"
                : "Lengths across the film are drawn " + Ticks.plain(factor) + " times "
                        + (factor > 1 ? "too large" : "their size");
    }

    @Override
    public double lowest() {
        return scene.bottom;
    }

    @Override
    public double highest() {
        return scene.top;
    }
}
