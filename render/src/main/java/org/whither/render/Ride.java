package org.whither.render;

import java.awt.geom.Ellipse2D;
import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.trace.Path;

/**
 * An animation that follows one piece of gas at a set distance behind it: inside the film, between the two faces, or over
 * the relief of the pressure. Its tube is its way through the film, in the frame in which that is steady, coloured by
 * speed; other tracers, let go at the same time, are small signs coloured and shaped by where they will end.
 */
public final class Ride implements Animation {
    /** Gas that leaves sooner after its start cannot be followed (s). */
    public static final double LEAST_SECONDS = 1e-9;

    /** Nothing small comes nearer to the eye than this share of its distance behind the gas. */
    private static final double CLEAR = 0.45;

    /** Colour of the followed gas in the film. */
    private static final int IN_FILM = 0xf4f4f2;

    /** The same on the relief, the heights of which are near white: the bluish green of Okabe and Ito (2008). */
    static final int ON_RELIEF = 0x009e73;

    private final MotionSettings settings;
    private final PictureSettings picture;
    private final FilmFlow flow;
    private final FilmShape shape;
    private final Track track;
    private final Clock clock;
    private final Terrain terrain;
    private final TowedCamera camera;
    private final MotionPage page;
    private final Signs signs;
    private final List<Track> others = new ArrayList<>();
    private final double[] spread;
    private final PictureSettings.Range speeds;
    private final double filmRate;
    private final double frameRate;
    private final String startWords;
    private final Scene.Item tube;
    private final Tube way;
    private final Scene.Item ball;
    private final Canvas canvas;

    private Ride(FilmFlow flow, Path followed, String startWords, List<Path> others, MotionSettings settings) {
        if (followed.points().size() < 2 || followed.end().time() < LEAST_SECONDS) {
            throw new IllegalArgumentException(
                    "the followed gas leaves the film where it starts; start it further inside the film");
        }
        this.settings = settings;
        this.picture = settings.picture();
        this.flow = flow;
        this.startWords = startWords;
        this.shape = new FilmShape(flow);
        this.track = new Track(followed);
        this.clock = new Clock(settings, track.duration());
        this.terrain = Terrains.of(shape, settings, true, 0);
        others.stream().filter(path -> path.points().size() > 1).forEach(path -> this.others.add(new Track(path)));
        this.spread = Terrains.spread(this.others.size(), shape.grid());
        Conditions conditions = flow.film().conditions();
        this.frameRate = picture.speedFrame().angularSpeed(conditions.rotationRate());
        this.filmRate = flow.film().steadyFrameSpeed() - frameRate;
        double[] found = speeds();
        this.speeds = picture.speedRange().orElse(Gap.range(found[0], found[1]));
        this.page = new MotionPage(picture, shape, captions(), legend(), bars(found), 4);
        double distance =
                settings.behind().isPresent() ? 1e3 * settings.behind().getAsDouble() : terrain.usualDistance();
        this.camera = new TowedCamera(track, clock, terrain, shape.grid(), distance, page.window);
        this.signs = new Signs(1.1 * terrain.tubeRadius());
        MeshBuilder mesh = new MeshBuilder();
        this.way = Tube.along(track, clock.end, terrain, speeds, 1.6 * terrain.tubeRadius(), Track.State::steadyTheta);
        way.addTo(mesh, terrain.tubeRadius());
        this.tube = new Scene.Item(mesh.build(), Scene.Material.scaled(ColourScale.SPEED, true), 0);
        MeshBuilder round = new MeshBuilder();
        Tubes.ball(round, 0, 0, 0, 2.1 * terrain.tubeRadius(), 1);
        this.ball = new Scene.Item(round.build(), Scene.Material.solid(gasColour(), 0.5), 0);
        this.canvas = new Canvas(picture.width(), picture.height());
    }

    /**
     * An animation that follows gas.
     *
     * @param flow the film and its motion
     * @param followed path of the gas, recorded in the frame of {@link PictureSettings#speedFrame}
     * @param startWords where it starts, as in "since the gas left the feed"
     * @param others paths of other gas that start over one sector, recorded in the same frame; spread over the ring by
     *     whole sectors; may be empty
     * @param settings what the animation is to be like
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the path has no length, the animation no frame, or the size does not fit the
     *     memory
     */
    public static Animation of(
            FilmFlow flow, Path followed, String startWords, List<Path> others, MotionSettings settings) {
        HeadlessGL.start();
        Canvas.checkSize(settings.picture().width(), settings.picture().height());
        return new Ride(flow, followed, startWords, others, settings);
    }

    /** Lowest speed, that below which nearly all of the way lies, and highest (m/s). */
    private double[] speeds() {
        int parts = 400;
        double[] values = new double[parts + 1];
        for (int n = 0; n <= parts; n++) {
            values[n] = track.at(track.duration() * n / parts).speed();
        }
        Arrays.sort(values);
        return new double[] {values[0], values[(int) (0.99 * parts)], values[parts]};
    }

    private List<String> captions() {
        return List.of(
                terrain.words() + "  ·  " + clock.words(),
                (settings.ground() == MotionSettings.Ground.GAP
                                ? "Followed inside the film, rotor below, stator above,"
                                : "Followed over the film, seen from the stator,")
                        + " in the " + (picture.speedFrame() == Frame.ROTATING ? "rotating" : "stationary")
                        + " frame, "
                        + (picture.speedFrame() == Frame.ROTATING
                                ? "in which the rotor stands still"
                                : "in which the stator stands still"));
    }

    private List<MotionPage.Entry> legend() {
        List<MotionPage.Entry> entries = new ArrayList<>();
        entries.add(new MotionPage.Entry(
                (ink, x, y) -> ink.mark(Destination.HELD.marker(x, y, 9 * ink.unit), gasColour(), ink.unit),
                "the followed gas; sizes not to scale"));
        entries.add(new MotionPage.Entry((ink, x, y) -> ring(ink, x, y, 6 * ink.unit), "ring: it is behind a wall"));
        if (settings.ground() == MotionSettings.Ground.GAP) {
            entries.add(new MotionPage.Entry(
                    (ink, x, y) -> {
                        ink.colour(0x56606b);
                        ink.stroke(1.6 * ink.unit);
                        ink.line(x - 6 * ink.unit, y, x + 6 * ink.unit, y);
                    },
                    "drawn on the stator above each " + 360 / FilmTerrain.MARKS + "°"));
            Terrains.feedEntry(shape).ifPresent(entries::add);
        }
        Set<Destination> seen = new LinkedHashSet<>();
        seen.add(track.destination());
        others.forEach(other -> seen.add(other.destination()));
        for (Destination destination : Destination.values()) {
            if (seen.contains(destination)) {
                entries.add(Terrains.entry(destination, flow.film().conditions()));
            }
        }
        return entries;
    }

    private int gasColour() {
        return settings.ground() == MotionSettings.Ground.RELIEF ? ON_RELIEF : IN_FILM;
    }

    private static void ring(Ink ink, double x, double y, double radius) {
        ink.colour(ink.text);
        ink.dashes(1.6 * ink.unit, 3.2 * ink.unit, 2.4 * ink.unit);
        ink.pen.draw(new Ellipse2D.Double(x - radius, y - radius, 2 * radius, 2 * radius));
    }

    private List<MotionPage.Bar> bars(double[] found) {
        List<MotionPage.Bar> bars = new ArrayList<>();
        Terrains.pressureBar(shape, settings).ifPresent(bars::add);
        bars.add(new MotionPage.Bar(
                ColourScale.SPEED,
                speeds.low(),
                speeds.high(),
                found[0] < speeds.low() - 1e-9,
                found[2] > speeds.high() + 1e-9,
                "speed " + Words.frame(picture.speedFrame()) + ", m/s"));
        return bars;
    }

    @Override
    public int width() {
        return picture.width();
    }

    @Override
    public int height() {
        return picture.height();
    }

    @Override
    public int frames() {
        return clock.frames;
    }

    @Override
    public double rate() {
        return clock.rate;
    }

    TowedCamera camera() {
        return camera;
    }

    Canvas canvas() {
        return canvas;
    }

    /** Where the followed gas is seen in a frame (pixels). */
    Point2D.Double seen(int number) {
        double[] p = TowedCamera.place(track.at(clock.time(number)), terrain);
        return camera.camera(number, page.window).project(p[0], p[1], p[2]);
    }

    java.awt.Rectangle window() {
        return page.window;
    }

    @Override
    public BufferedImage draw(int number) {
        double time = clock.time(number);
        Track.State state = track.at(time);
        double filmTurn = filmRate * time;
        double statorTurn = -frameRate * time;
        Camera view = camera.camera(number, page.window);
        double[] eye = camera.eye(number);
        double[] aim = camera.aim(number);
        double[] gas = TowedCamera.place(state, terrain);

        List<Scene.Item> items = new ArrayList<>(terrain.items(filmTurn, statorTurn, eye));
        // The tube lies in the film and turns with it.
        double[] eyeInFilm = {
            Math.cos(filmTurn) * eye[0] + Math.sin(filmTurn) * eye[1],
            Math.cos(filmTurn) * eye[1] - Math.sin(filmTurn) * eye[0],
            eye[2]
        };
        int[] shown = way.triangles(time, eyeInFilm, CLEAR * camera.distance());
        items.add(tube.part(shown[0], shown[1]).turned(filmTurn));
        items.add(ball.at(gas[0], gas[1], gas[2]));
        for (int n = 0; n < others.size(); n++) {
            Track other = others.get(n);
            double turn = spread[n];
            if (time < other.duration()) {
                double[] p = Tube.place(other.at(time), terrain, s -> s.theta() + turn);
                if (Math.hypot(Math.hypot(p[0] - eye[0], p[1] - eye[1]), p[2] - eye[2]) > CLEAR * camera.distance()) {
                    items.add(signs.item(other.destination(), p));
                }
            }
        }
        Scene scene = new Scene(items, terrain.light(Math.atan2(aim[1] - eye[1], aim[0] - eye[0])));
        BufferedImage image = canvas.draw(Ink.paper(picture), List.of(new Canvas.View(scene, view)));
        boolean hidden = terrain.hidden(gas, eye, filmTurn);
        page.complete(image, figures(state, time), filmTurn, ink -> {
            plan(ink, state, time, eye, aim);
            if (hidden) {
                Point2D.Double at = view.project(gas[0], gas[1], gas[2]);
                ring(ink, at.x, at.y, 13 * ink.unit);
            }
            if (number >= clock.frames - 1 || time >= clock.end) {
                ending(ink, time);
            }
        });
        return image;
    }

    private List<MotionPage.Figure> figures(Track.State state, double time) {
        Track.State start = track.at(0);
        double turns = (state.theta() - start.theta() + frameRate * time) / (2 * Math.PI);
        String frame = picture.speedFrame() == Frame.ROTATING ? "rotating frame" : "stationary frame";
        return List.of(
                new MotionPage.Figure(Ticks.number(1e3 * time, 3) + " ms", startWords, "since its release"),
                new MotionPage.Figure(
                        Ticks.number(turns, 3), "revolutions (stationary frame)", "turns, stationary frame"),
                new MotionPage.Figure(
                        Ticks.number(1e-5 * state.pressure(), 2) + " bar(a)",
                        "pressure of the followed gas",
                        "its pressure"),
                new MotionPage.Figure(
                        Ticks.number(state.speed(), 1) + " m/s", "its speed, " + frame, "speed, " + frame));
    }

    private void plan(Ink ink, Track.State state, double time, double[] eye, double[] aim) {
        List<double[]> places = new ArrayList<>();
        int parts = 1 + (int) (240 * time / track.duration());
        for (int n = 0; n <= parts; n++) {
            Track.State s = track.at(time * n / parts);
            places.add(new double[] {s.steadyTheta() + filmRate * time, s.radius()});
        }
        page.eye(ink, eye, aim);
        page.line(ink, places, ink.dark() ? 0x8dc070 : 0x3e708f);
        Point2D.Double at = page.onPlan(state.theta(), state.radius());
        ink.mark(Destination.HELD.marker(at.x, at.y, 8 * ink.unit), gasColour(), 1.2 * ink.unit);
    }

    /** Says at the end where the gas went. */
    private void ending(Ink ink, double time) {
        double u = ink.unit;
        boolean ended = time >= track.duration() * (1 - 1e-9);
        Destination destination = track.destination();
        String words = !ended
                ? "the animation ends here; the gas goes on"
                : destination == Destination.HELD
                        ? "still in the film after " + Gap.time(track.duration())
                        : "it has gone " + destination.words(flow.film().conditions());
        double wide = ink.width(ink.heading, words) + (ended ? 42 : 24) * u;
        double high = ink.height(ink.heading) + 12 * u;
        double x = page.window.getCenterX() - 0.5 * wide;
        double y = page.window.getMaxY() - high - 12 * u;
        ink.colour(ink.paper, 0.88);
        ink.pen.fill(new java.awt.geom.RoundRectangle2D.Double(x, y, wide, high, 8 * u, 8 * u));
        double base = y + 0.5 * high + 0.36 * ink.heading.getSize2D();
        if (ended) {
            ink.mark(destination.marker(x + 18 * u, y + 0.5 * high, 11 * u), destination.colour(), u);
        }
        ink.write(ink.heading, ink.text, words, x + (ended ? 32 : 12) * u, base, Ink.Side.LEFT);
    }

    @Override
    public List<Integer> keyColours() {
        return Terrains.keyColours(picture, settings.ground() == MotionSettings.Ground.RELIEF, true);
    }

    @Override
    public String words() {
        return terrain.words() + "; " + clock.words();
    }

    @Override
    public void close() {
        canvas.close();
    }
}
