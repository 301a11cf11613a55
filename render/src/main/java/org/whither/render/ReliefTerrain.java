package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import org.whither.film.FilmGrid;

/** The film pressure as height over the whole ring, on which gas is laid. */
final class ReliefTerrain implements Terrain {
    private final ReliefScene scene;
    private final FilmGrid grid;

    ReliefTerrain(ReliefScene scene, FilmGrid grid) {
        this.scene = scene;
        this.grid = grid;
    }

    @Override
    public double height(double steadyTheta, double radius, double z) {
        return scene.heightAt(steadyTheta, radius) + 1.2 * tubeRadius();
    }

    @Override
    public List<Scene.Item> items(double filmTurn, double statorTurn, double[] eye) {
        List<Scene.Item> items = new ArrayList<>();
        Terrains.around(scene.surface(), filmTurn, eye, 0.5 * grid.pitch(), items);
        Terrains.around(scene.lines(), filmTurn, eye, 0.5 * grid.pitch(), items);
        return items;
    }

    @Override
    public boolean hidden(double[] place, double[] eye, double filmTurn) {
        return scene.hidden(turned(place, -filmTurn), turned(eye, -filmTurn));
    }

    private static double[] turned(double[] p, double angle) {
        double cos = Math.cos(angle);
        double sin = Math.sin(angle);
        return new double[] {cos * p[0] - sin * p[1], sin * p[0] + cos * p[1], p[2]};
    }

    @Override
    public double eyeHeight(double steadyTheta, double radius, double gasHeight, double behind) {
        double here = scene.heightAt(steadyTheta, radius);
        return Math.max(here + 0.34 * behind, gasHeight + 0.52 * behind);
    }

    @Override
    public double aimHeight(double gasHeight, double eyeHeight) {
        return gasHeight;
    }

    @Override
    public double usualDistance() {
        return 2.1e3 * (grid.outerRadius() - grid.innerRadius());
    }

    @Override
    public double fieldOfView() {
        return Math.toRadians(40);
    }

    @Override
    public double tubeRadius() {
        return 0.5 * scene.tubeRadius();
    }

    @Override
    public Scene.Light light(double azimuth) {
        // Fixed to the ring: shadows do not wander as the eye turns.
        return Scene.Light.from(0.55, 0.45, 0.75);
    }

    @Override
    public double lowest() {
        return scene.bottom();
    }

    @Override
    public double highest() {
        return scene.top();
    }

    @Override
    public String words() {
        return "Film pressure drawn as height: " + Ticks.plain(scene.barPerMillimetre())
                + " bar per mm, on the scale of the lengths along the face";
    }
}
