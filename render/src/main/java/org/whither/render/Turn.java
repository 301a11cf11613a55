package org.whither.render;

import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Set;
import org.whither.film.FilmFlow;
import org.whither.film.Frame;
import org.whither.trace.Path;

/**
 * An animation of the whole ring that stands still while the eye goes round it once, with paths as tubes coloured by
 * speed. It can be played again and again without a jump.
 */
public final class Turn implements Animation {
    private static final int MARKERS = 12;
    private static final int MARKER = 0xf4f4f2;

    private final MotionSettings settings;
    private final PictureSettings picture;
    private final FilmFlow flow;
    private final Terrain terrain;
    private final MotionPage page;
    private final Orbit orbit;
    private final Scene scene;
    private final int frames;
    private final Canvas canvas;

    private Turn(FilmFlow flow, List<Path> paths, MotionSettings settings) {
        this.settings = settings;
        this.picture = settings.picture();
        this.flow = flow;
        double seconds = settings.seconds().orElse(MotionSettings.USUAL_SECONDS);
        double count = Math.rint(seconds * settings.rate());
        if (!(count >= 1) || count > MotionSettings.MOST_FRAMES) {
            throw new IllegalArgumentException("an animation of " + Ticks.number(count, 0) + " frames; expected 1 … "
                    + MotionSettings.MOST_FRAMES);
        }
        this.frames = (int) count;
        FilmShape shape = new FilmShape(flow);
        this.terrain = Terrains.of(shape, settings, false, Math.PI / 2);
        List<Path> drawn =
                paths.stream().filter(path -> path.points().size() > 1).toList();
        List<Track> tracks = drawn.stream().map(Track::new).toList();
        double[] found = Relief.speeds(drawn);
        PictureSettings.Range speeds = picture.speedRange()
                .orElse(found == null ? new PictureSettings.Range(0, 1) : Gap.range(found[0], found[1]));
        double every = Ticks.step(
                Math.max(
                        1e-9, tracks.stream().mapToDouble(Track::duration).max().orElse(1)),
                MARKERS - 1);
        List<MotionPage.Bar> bars = new ArrayList<>();
        Terrains.pressureBar(shape, settings).ifPresent(bars::add);
        if (found != null) {
            bars.add(new MotionPage.Bar(
                    ColourScale.SPEED,
                    speeds.low(),
                    speeds.high(),
                    found[0] < speeds.low() - 1e-9,
                    found[2] > speeds.high() + 1e-9,
                    "speed " + Words.frame(picture.speedFrame()) + ", m/s"));
        }
        this.page = new MotionPage(
                picture,
                shape,
                List.of(terrain.words() + Ink.DOT + "the whole ring, seen from all round; time stands still"),
                legend(tracks, every),
                bars,
                0);
        this.orbit = new Orbit(
                Math.toRadians(settings.ground() == MotionSettings.Ground.RELIEF ? 44 : 38),
                1e3 * shape.grid().outerRadius(),
                terrain.lowest(),
                terrain.highest(),
                page.window);
        List<Scene.Item> items = new ArrayList<>(terrain.items(0, 0, null));
        items.addAll(paths(tracks, shape, speeds, every));
        this.scene = new Scene(items, terrain.light(0));
        this.canvas = new Canvas(picture.width(), picture.height());
    }

    /**
     * An animation round the seal.
     *
     * @param flow the film and its motion
     * @param paths paths, recorded in the frame of {@link PictureSettings#speedFrame}, spread by whole sectors round the
     *     ring; may be empty
     * @param settings what the animation is to be like
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the animation has no frame, or its size does not fit the memory
     */
    public static Animation of(FilmFlow flow, List<Path> paths, MotionSettings settings) {
        HeadlessGL.start();
        Canvas.checkSize(settings.picture().width(), settings.picture().height());
        return new Turn(flow, paths, settings);
    }

    private List<MotionPage.Entry> legend(List<Track> tracks, double every) {
        List<MotionPage.Entry> entries = new ArrayList<>();
        Set<Destination> seen = new LinkedHashSet<>();
        tracks.forEach(track -> seen.add(track.destination()));
        for (Destination destination : Destination.values()) {
            if (seen.contains(destination)) {
                entries.add(Terrains.entry(destination, flow.film().conditions()));
            }
        }
        if (!tracks.isEmpty()) {
            entries.add(new MotionPage.Entry(
                    (ink, x, y) -> ink.mark(Destination.HELD.marker(x, y, 7 * ink.unit), MARKER, ink.unit),
                    "one marker each " + Gap.time(every) + "; tubes not to size"));
        }
        if (settings.ground() == MotionSettings.Ground.GAP) {
            Terrains.feedEntry(new FilmShape(flow)).ifPresent(entries::add);
        }
        return entries;
    }

    /** Tubes in the frame in which the film is steady, which lie on what is drawn, spread evenly by whole sectors. */
    private List<Scene.Item> paths(List<Track> tracks, FilmShape shape, PictureSettings.Range speeds, double every) {
        List<Scene.Item> items = new ArrayList<>();
        Signs signs = new Signs(3.2 * terrain.tubeRadius());
        MeshBuilder tubes = new MeshBuilder();
        MeshBuilder markers = new MeshBuilder();
        int sectors = shape.grid().sectors();
        double radius = 1.25 * terrain.tubeRadius();
        for (int n = 0; n < tracks.size(); n++) {
            Track track = tracks.get(n);
            double shift = Math.rint((double) n * sectors / tracks.size())
                    * shape.grid().pitch();
            Tube tube =
                    Tube.along(track, track.duration(), terrain, speeds, 2.5 * radius, s -> s.steadyTheta() + shift);
            tube.addTo(tubes, radius);
            for (int m = 1; m * every < track.duration(); m++) {
                double[] p = Tube.place(track.at(m * every), terrain, s -> s.steadyTheta() + shift);
                Tubes.ball(markers, p[0], p[1], p[2], 1.7 * radius, 1);
            }
            double[] end = Tube.place(track.at(track.duration()), terrain, s -> s.steadyTheta() + shift);
            double out =
                    track.destination() == Destination.OUTER ? 1 : track.destination() == Destination.INNER ? -1 : 0;
            double flat = Math.hypot(end[0], end[1]);
            double further = 1 + out * 5 * radius / flat;
            items.add(signs.item(track.destination(), new double[] {further * end[0], further * end[1], end[2]}));
        }
        Terrains.add(items, tubes, Scene.Material.scaled(ColourScale.SPEED, true));
        Terrains.add(items, markers, Scene.Material.solid(MARKER, 0.5));
        return items;
    }

    private double azimuth(int number) {
        return -Math.PI / 2 + 2 * Math.PI * number / frames;
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
        return frames;
    }

    @Override
    public double rate() {
        return settings.rate();
    }

    Canvas canvas() {
        return canvas;
    }

    @Override
    public BufferedImage draw(int number) {
        double azimuth = azimuth(number);
        BufferedImage image = canvas.draw(Ink.paper(picture), List.of(new Canvas.View(scene, orbit.camera(azimuth))));
        double[] eye = orbit.eye(azimuth);
        double reach = 1.16e3 * flow.film().grid().outerRadius() / Math.hypot(eye[0], eye[1]);
        page.complete(
                image,
                List.of(),
                0,
                ink -> page.eye(ink, new double[] {reach * eye[0], reach * eye[1], 0}, new double[3]));
        return image;
    }

    @Override
    public List<Integer> keyColours() {
        return Terrains.keyColours(picture, settings.ground() == MotionSettings.Ground.RELIEF, true);
    }

    @Override
    public String words() {
        return terrain.words() + "; once round the ring, "
                + (picture.speedFrame() == Frame.ROTATING ? "rotating" : "stationary") + " frame";
    }

    @Override
    public void close() {
        canvas.close();
    }
}
