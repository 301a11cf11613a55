package org.whither.render;

import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.EnumMap;
import java.util.List;
import java.util.Map;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.trace.Path;

/**
 * An animation of many pieces of gas that are let go at once, each a small sign whose colour and shape tell from the start
 * where it will end. Gas that has left stays at the rim where it left. Each sign stands for the same mass flow.
 */
public final class LetGo implements Animation {
    /** Share of the gas whose end the usual length waits for. */
    private static final double WAITED_FOR = 0.97;

    private final MotionSettings settings;
    private final PictureSettings picture;
    private final FilmFlow flow;
    private final Terrain terrain;
    private final MotionPage page;
    private final Orbit orbit;
    private final Clock clock;
    private final List<Track> tracks;
    private final double[] spread;
    private final Signs signs;
    private final Map<Destination, Integer> counts = new EnumMap<>(Destination.class);
    private final double signRadius;
    private final double filmRate;
    private final double frameRate;
    private final String from;
    private final Canvas canvas;

    private LetGo(FilmFlow flow, List<Path> paths, String from, MotionSettings settings) {
        this.settings = settings;
        this.picture = settings.picture();
        this.flow = flow;
        this.from = from;
        this.tracks = paths.stream()
                .filter(path -> path.points().size() > 1)
                .map(Track::new)
                .toList();
        if (tracks.isEmpty()) {
            throw new IllegalArgumentException("no gas to let go: none enters the film, or all of it leaves at once");
        }
        double[] durations =
                tracks.stream().mapToDouble(Track::duration).sorted().toArray();
        this.clock = new Clock(settings, durations[(int) (WAITED_FOR * (durations.length - 1))]);
        FilmShape shape = new FilmShape(flow);
        double azimuth = azimuth();
        this.terrain = Terrains.of(shape, settings, false, azimuth + Math.toRadians(150));
        Conditions conditions = flow.film().conditions();
        this.frameRate = picture.speedFrame().angularSpeed(conditions.rotationRate());
        this.filmRate = flow.film().steadyFrameSpeed() - frameRate;
        this.spread = Terrains.spread(tracks.size(), shape.grid());
        for (Track track : tracks) {
            counts.merge(track.destination(), 1, Integer::sum);
        }
        this.page = new MotionPage(picture, shape, captions(), legend(shape), bars(shape), 2 + counts.size());
        this.orbit = new Orbit(
                Math.toRadians(50),
                1.03e3 * shape.grid().outerRadius(),
                terrain.lowest(),
                terrain.highest(),
                page.window);
        double face = 1e3 * (shape.grid().outerRadius() - shape.grid().innerRadius());
        this.signRadius = Math.max(0.028 * face, 0.0035e3 * shape.grid().outerRadius());
        this.signs = new Signs(signRadius);
        this.canvas = new Canvas(picture.width(), picture.height());
    }

    private static double azimuth() {
        return -Math.PI / 2;
    }

    /**
     * An animation of gas that is let go.
     *
     * @param flow the film and its motion
     * @param paths paths, each for the same mass flow, recorded in the frame of {@link PictureSettings#speedFrame}, that
     *     start over one sector; they are spread over the ring by whole sectors
     * @param from where they start, as in "since the gas entered by the feed"
     * @param settings what the animation is to be like
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where there is no gas, the animation has no frame, or its size does not fit the
     *     memory
     */
    public static Animation of(FilmFlow flow, List<Path> paths, String from, MotionSettings settings) {
        HeadlessGL.start();
        Canvas.checkSize(settings.picture().width(), settings.picture().height());
        return new LetGo(flow, paths, from, settings);
    }

    private List<String> captions() {
        String frame = picture.speedFrame() == Frame.ROTATING
                ? "rotating frame: the rotor stands still"
                : "stationary frame: the stator stands still";
        String seen = settings.ground() == MotionSettings.Ground.GAP
                ? "seen from the stator, most of which is cut away"
                : ViewingSide.STATOR.words();
        String count = tracks.size() + " pieces of gas let go at once, each for the same mass flow";
        return List.of(String.join(Ink.DOT, terrain.words(), clock.words()), String.join(Ink.DOT, count, frame, seen));
    }

    private List<MotionPage.Entry> legend(FilmShape shape) {
        List<MotionPage.Entry> entries = new ArrayList<>();
        for (Destination destination : counts.keySet()) {
            entries.add(Terrains.entry(destination, flow.film().conditions()));
        }
        if (settings.ground() == MotionSettings.Ground.GAP) {
            Terrains.feedEntry(shape).ifPresent(entries::add);
        }
        entries.add(new MotionPage.Entry((ink, x, y) -> {}, "not to scale; gas that has left stays at the rim"));
        return entries;
    }

    private List<MotionPage.Bar> bars(FilmShape shape) {
        return Terrains.pressureBar(shape, settings).map(List::of).orElse(List.of());
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

    Canvas canvas() {
        return canvas;
    }

    Camera camera() {
        return orbit.camera(azimuth());
    }

    /** The drawn place of a piece of gas in a frame; just beyond the rim where it has left (mm). */
    double[] place(int piece, int number) {
        double time = clock.time(number);
        Track track = tracks.get(piece);
        Track.State s = track.at(time);
        boolean left = time >= track.duration();
        double turn = left ? filmTurnSinceEnd(track, time) : 0;
        double[] p = Tube.place(s, terrain, state -> state.theta() + spread[piece] + turn);
        if (left) {
            double out =
                    track.destination() == Destination.OUTER ? 1 : track.destination() == Destination.INNER ? -1 : 0;
            double scale = 1 + out * 1.6 * signRadius / Math.hypot(p[0], p[1]);
            p[0] *= scale;
            p[1] *= scale;
        }
        return p;
    }

    /** Gas that has left stays at its place of the film's rim, which may turn in the frame of view (rad). */
    private double filmTurnSinceEnd(Track track, double time) {
        return filmRate * (time - track.duration());
    }

    Destination destination(int piece) {
        return tracks.get(piece).destination();
    }

    @Override
    public BufferedImage draw(int number) {
        double time = clock.time(number);
        double filmTurn = filmRate * time;
        List<Scene.Item> items = new ArrayList<>(terrain.items(filmTurn, -frameRate * time, null));
        Map<Destination, Integer> left = new EnumMap<>(Destination.class);
        int inside = 0;
        List<double[]> places = new ArrayList<>();
        for (int n = 0; n < tracks.size(); n++) {
            Track track = tracks.get(n);
            double[] p = place(n, number);
            places.add(p);
            items.add(signs.item(track.destination(), p));
            if (time >= track.duration()) {
                left.merge(track.destination(), 1, Integer::sum);
            } else {
                inside++;
            }
        }
        Scene scene = new Scene(items, terrain.light(azimuth()));
        BufferedImage image = canvas.draw(Ink.paper(picture), List.of(new Canvas.View(scene, camera())));
        page.complete(image, figures(time, inside, left), filmTurn, ink -> plan(ink, places));
        return image;
    }

    private List<MotionPage.Figure> figures(double time, int inside, Map<Destination, Integer> left) {
        Conditions conditions = flow.film().conditions();
        List<MotionPage.Figure> figures = new ArrayList<>();
        figures.add(new MotionPage.Figure(Ticks.number(1e3 * time, 3) + " ms", from, "since the release"));
        figures.add(new MotionPage.Figure(
                Integer.toString(inside), "of " + tracks.size() + " are in the film", "are in the film"));
        for (Destination destination : counts.keySet()) {
            if (destination != Destination.HELD && destination != Destination.UNKNOWN) {
                figures.add(new MotionPage.Figure(
                        left.getOrDefault(destination, 0).toString(),
                        destination.words(conditions),
                        destination.words(conditions).replaceAll(" \\(.*", "")));
            }
        }
        return figures;
    }

    private void plan(Ink ink, List<double[]> places) {
        double size = Math.max(2, 3 * ink.unit);
        for (int n = 0; n < places.size(); n++) {
            double[] p = places.get(n);
            Point2D.Double at = page.onPlan(Math.atan2(p[1], p[0]), 1e-3 * Math.hypot(p[0], p[1]));
            ink.colour(tracks.get(n).destination().colour());
            ink.pen.fill(new java.awt.geom.Ellipse2D.Double(at.x - 0.5 * size, at.y - 0.5 * size, size, size));
        }
    }

    @Override
    public List<Integer> keyColours() {
        return Terrains.keyColours(picture, settings.ground() == MotionSettings.Ground.RELIEF, false);
    }

    @Override
    public String words() {
        return tracks.size() + " pieces of gas let go at once; " + terrain.words() + "; " + clock.words();
    }

    /** Numbers of pieces by where they end, for tests. */
    int[] counts() {
        return Arrays.stream(Destination.values())
                .mapToInt(d -> counts.getOrDefault(d, 0))
                .toArray();
    }

    @Override
    public void close() {
        canvas.close();
    }
}
