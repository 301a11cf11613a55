package org.whither.render;

import com.jogamp.common.nio.Buffers;
import com.jogamp.opengl.GL;
import com.jogamp.opengl.GL3;
import com.jogamp.opengl.GLContext;
import com.jogamp.opengl.GLException;
import com.jogamp.opengl.GLOffscreenAutoDrawable;
import java.awt.Rectangle;
import java.awt.image.BufferedImage;
import java.awt.image.DataBufferInt;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.IntBuffer;
import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Collections;
import java.util.EnumMap;
import java.util.IdentityHashMap;
import java.util.List;
import java.util.Set;

/**
 * Draws scenes by OpenGL 3.3 core into an anti-aliased framebuffer of its own and hands back the pixels. Meshes are sent
 * once and kept while the canvas is open, so that the next picture of the same meshes costs no transfer. Everything is
 * released by {@link #close}. One thread at a time; several canvases may be open.
 */
final class Canvas implements AutoCloseable {
    /** Edge of the square shadow picture (pixels). */
    private static final int SHADOW = 2048;

    private static final int SAMPLES = 4;

    /** Longest side of what is drawn at once (pixels): larger pictures are drawn in tiles of equal size. */
    private static final int TILE = 2048;

    /** Bytes of memory of Java that a pixel of a picture needs on its way to a file. */
    private static final int BYTES_PER_PIXEL = 12;

    /** A scene and how it falls on the picture. */
    record View(Scene scene, Camera camera) {}

    /** A mesh in the storage of OpenGL: its vertex array, its four buffers, and how many corners it has. */
    private static final class Stored {
        final int array;
        final int[] buffers;
        final int corners;

        Stored(int array, int[] buffers, int corners) {
            this.array = array;
            this.buffers = buffers;
            this.corners = corners;
        }
    }

    private final int width;
    private final int height;
    private final int tileWidth;
    private final int tileHeight;
    private final GLOffscreenAutoDrawable drawable;
    private final IdentityHashMap<Mesh, Stored> stored = new IdentityHashMap<>();
    private final EnumMap<ColourScale, Integer> scales = new EnumMap<>(ColourScale.class);
    private final List<Integer> programs = new ArrayList<>();
    private final int[] framebuffers = new int[3];
    private final int[] renderbuffers = new int[3];
    private final int[] shadowTexture = new int[1];
    private int sceneProgram;
    private int shadowProgram;
    private IntBuffer pixels;
    /** What the shadow picture shows now, and how it was projected; null where it shows nothing. */
    private List<Scene.Item> shadowCasters;

    private Scene.Light shadowLight;
    private double[] shadowMatrix;

    /**
     * Opens a canvas.
     *
     * @param width width of the pictures (pixels)
     * @param height height of the pictures (pixels)
     * @throws NoOpenGL where OpenGL cannot be started
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    Canvas(int width, int height) {
        this(width, height, TILE);
    }

    /** As above, with tiles of a given longest side (pixels). */
    Canvas(int width, int height, int tile) {
        checkSize(width, height);
        this.width = width;
        this.height = height;
        this.tileWidth = parts(width, tile);
        this.tileHeight = parts(height, tile);
        this.drawable = HeadlessGL.open();
        boolean ready = false;
        try {
            GL3 gl = begin();
            prepare(gl);
            ready = true;
        } finally {
            if (ready) {
                end();
            } else {
                close();
            }
        }
    }

    /** The size of the equal parts, none longer than asked for, that cover a length. */
    private static int parts(int length, int most) {
        int count = (length + most - 1) / most;
        return (length + count - 1) / count;
    }

    /**
     * Checks that the memory can hold a picture.
     *
     * @throws IllegalArgumentException where it cannot
     */
    static void checkSize(int width, int height) {
        if (width < 1 || height < 1) {
            throw new IllegalArgumentException(
                    "picture of " + width + " × " + height + " pixels; expected at least one pixel each way");
        }
        double needed = (double) width * height * BYTES_PER_PIXEL;
        double free = freeMemory();
        if (needed > free) {
            System.gc();
            free = freeMemory();
        }
        if (needed > free || (double) width * height > Integer.MAX_VALUE - 8) {
            throw new IllegalArgumentException("picture of " + width + " × " + height + " pixels needs "
                    + Math.round(needed / 1e6) + " MB of memory, and " + Math.round(free / 1e6)
                    + " MB are free; choose a smaller size or give the program more memory, as with"
                    + " WHITHER_JAVA_OPTS=-Xmx8g in the environment");
        }
    }

    private static double freeMemory() {
        Runtime runtime = Runtime.getRuntime();
        return (double) runtime.maxMemory() - runtime.totalMemory() + runtime.freeMemory();
    }

    private GL3 begin() {
        int made = drawable.getContext().makeCurrent();
        if (made == GLContext.CONTEXT_NOT_CURRENT) {
            throw new NoOpenGL(new GLException("the OpenGL context cannot be made current"));
        }
        return drawable.getContext().getGL().getGL3();
    }

    private void end() {
        drawable.getContext().release();
    }

    private void prepare(GL3 gl) {
        int[] most = new int[1];
        gl.glGetIntegerv(GL3.GL_MAX_SAMPLES, most, 0);
        int samples = Math.min(SAMPLES, most[0]);
        gl.glGenFramebuffers(3, framebuffers, 0);
        gl.glGenRenderbuffers(3, renderbuffers, 0);
        storage(gl, renderbuffers[0], GL.GL_RGBA8, samples);
        storage(gl, renderbuffers[1], GL.GL_DEPTH_COMPONENT24, samples);
        storage(gl, renderbuffers[2], GL.GL_RGBA8, 0);
        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[0]);
        attach(gl, GL.GL_COLOR_ATTACHMENT0, renderbuffers[0]);
        attach(gl, GL.GL_DEPTH_ATTACHMENT, renderbuffers[1]);
        whole(gl);
        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[1]);
        attach(gl, GL.GL_COLOR_ATTACHMENT0, renderbuffers[2]);
        whole(gl);

        gl.glGenTextures(1, shadowTexture, 0);
        gl.glBindTexture(GL.GL_TEXTURE_2D, shadowTexture[0]);
        gl.glTexImage2D(
                GL.GL_TEXTURE_2D,
                0,
                GL.GL_DEPTH_COMPONENT24,
                SHADOW,
                SHADOW,
                0,
                GL3.GL_DEPTH_COMPONENT,
                GL.GL_UNSIGNED_INT,
                null);
        filter(gl, GL.GL_LINEAR);
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL3.GL_TEXTURE_COMPARE_MODE, GL3.GL_COMPARE_REF_TO_TEXTURE);
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL3.GL_TEXTURE_COMPARE_FUNC, GL.GL_LEQUAL);
        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[2]);
        gl.glFramebufferTexture2D(GL.GL_FRAMEBUFFER, GL.GL_DEPTH_ATTACHMENT, GL.GL_TEXTURE_2D, shadowTexture[0], 0);
        gl.glDrawBuffer(GL.GL_NONE);
        gl.glReadBuffer(GL.GL_NONE);
        whole(gl);

        for (ColourScale scale : ColourScale.values()) {
            scales.put(scale, texture(gl, scale));
        }
        sceneProgram = program(gl, "scene");
        shadowProgram = program(gl, "shadow");
        check(gl, "setting up");
    }

    private void storage(GL3 gl, int buffer, int format, int samples) {
        gl.glBindRenderbuffer(GL.GL_RENDERBUFFER, buffer);
        gl.glRenderbufferStorageMultisample(GL.GL_RENDERBUFFER, samples, format, tileWidth, tileHeight);
    }

    private static void attach(GL3 gl, int where, int buffer) {
        gl.glFramebufferRenderbuffer(GL.GL_FRAMEBUFFER, where, GL.GL_RENDERBUFFER, buffer);
    }

    private static void whole(GL3 gl) {
        int status = gl.glCheckFramebufferStatus(GL.GL_FRAMEBUFFER);
        if (status != GL.GL_FRAMEBUFFER_COMPLETE) {
            throw new GLException("framebuffer status 0x" + Integer.toHexString(status));
        }
    }

    private static void filter(GL3 gl, int filter) {
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL.GL_TEXTURE_MIN_FILTER, filter);
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL.GL_TEXTURE_MAG_FILTER, filter);
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL.GL_TEXTURE_WRAP_S, GL.GL_CLAMP_TO_EDGE);
        gl.glTexParameteri(GL.GL_TEXTURE_2D, GL.GL_TEXTURE_WRAP_T, GL.GL_CLAMP_TO_EDGE);
    }

    private static int texture(GL3 gl, ColourScale scale) {
        int[] name = new int[1];
        gl.glGenTextures(1, name, 0);
        gl.glBindTexture(GL.GL_TEXTURE_2D, name[0]);
        ByteBuffer texels = Buffers.newDirectByteBuffer(4 * ColourScale.ENTRIES);
        for (int colour : scale.table()) {
            texels.put((byte) (colour >> 16))
                    .put((byte) (colour >> 8))
                    .put((byte) colour)
                    .put((byte) 0xff);
        }
        texels.rewind();
        gl.glTexImage2D(
                GL.GL_TEXTURE_2D, 0, GL.GL_RGBA8, ColourScale.ENTRIES, 1, 0, GL.GL_RGBA, GL.GL_UNSIGNED_BYTE, texels);
        filter(gl, GL.GL_LINEAR);
        return name[0];
    }

    private int program(GL3 gl, String name) {
        int vertex = shader(gl, GL3.GL_VERTEX_SHADER, name + ".vert");
        int fragment = shader(gl, GL3.GL_FRAGMENT_SHADER, name + ".frag");
        int program = gl.glCreateProgram();
        programs.add(program);
        gl.glAttachShader(program, vertex);
        gl.glAttachShader(program, fragment);
        gl.glLinkProgram(program);
        gl.glDetachShader(program, vertex);
        gl.glDetachShader(program, fragment);
        gl.glDeleteShader(vertex);
        gl.glDeleteShader(fragment);
        int[] done = new int[1];
        gl.glGetProgramiv(program, GL3.GL_LINK_STATUS, done, 0);
        if (done[0] == 0) {
            byte[] log = new byte[4096];
            int[] length = new int[1];
            gl.glGetProgramInfoLog(program, log.length, length, 0, log, 0);
            throw new GLException(
                    "shader program " + name + ": " + new String(log, 0, length[0], StandardCharsets.UTF_8));
        }
        return program;
    }

    private static int shader(GL3 gl, int kind, String file) {
        String text;
        try (InputStream in = Canvas.class.getResourceAsStream(file)) {
            text = new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException problem) {
            throw new UncheckedIOException(problem);
        }
        int shader = gl.glCreateShader(kind);
        gl.glShaderSource(shader, 1, new String[] {text}, null);
        gl.glCompileShader(shader);
        int[] done = new int[1];
        gl.glGetShaderiv(shader, GL3.GL_COMPILE_STATUS, done, 0);
        if (done[0] == 0) {
            byte[] log = new byte[4096];
            int[] length = new int[1];
            gl.glGetShaderInfoLog(shader, log.length, length, 0, log, 0);
            throw new GLException("shader " + file + ": " + new String(log, 0, length[0], StandardCharsets.UTF_8));
        }
        return shader;
    }

    private Stored store(GL3 gl, Mesh mesh) {
        int[] array = new int[1];
        int[] buffers = new int[4];
        gl.glGenVertexArrays(1, array, 0);
        gl.glBindVertexArray(array[0]);
        gl.glGenBuffers(4, buffers, 0);
        attribute(gl, buffers[0], 0, 3, mesh.positions());
        attribute(gl, buffers[1], 1, 3, mesh.normals());
        attribute(gl, buffers[2], 2, 1, mesh.values());
        gl.glBindBuffer(GL.GL_ELEMENT_ARRAY_BUFFER, buffers[3]);
        IntBuffer corners = Buffers.newDirectIntBuffer(mesh.triangles());
        gl.glBufferData(GL.GL_ELEMENT_ARRAY_BUFFER, 4L * corners.limit(), corners, GL.GL_STATIC_DRAW);
        gl.glBindVertexArray(0);
        return new Stored(array[0], buffers, mesh.triangles().length);
    }

    private static void attribute(GL3 gl, int buffer, int location, int size, float[] values) {
        gl.glBindBuffer(GL.GL_ARRAY_BUFFER, buffer);
        gl.glBufferData(
                GL.GL_ARRAY_BUFFER, 4L * values.length, Buffers.newDirectFloatBuffer(values), GL.GL_STATIC_DRAW);
        gl.glEnableVertexAttribArray(location);
        gl.glVertexAttribPointer(location, size, GL.GL_FLOAT, false, 0, 0);
    }

    /**
     * Draws a picture. Meshes that the picture before had and this one has not are released.
     *
     * @param background colour where nothing is drawn, sRGB 0xRRGGBB
     * @param views scenes and their windows, later ones over earlier ones
     * @return the picture
     * @throws GLException where OpenGL reports an error
     */
    BufferedImage draw(int background, List<View> views) {
        GL3 gl = begin();
        try {
            store(gl, views);
            BufferedImage image = new BufferedImage(width, height, BufferedImage.TYPE_INT_RGB);
            if (pixels == null) {
                pixels = Buffers.newDirectIntBuffer(tileWidth * tileHeight);
            }
            for (int y = 0; y < height; y += tileHeight) {
                for (int x = 0; x < width; x += tileWidth) {
                    Rectangle tile =
                            new Rectangle(x, y, Math.min(tileWidth, width - x), Math.min(tileHeight, height - y));
                    gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[0]);
                    gl.glViewport(0, 0, tileWidth, tileHeight);
                    gl.glDisable(GL.GL_SCISSOR_TEST);
                    gl.glClearColor(channel(background, 16), channel(background, 8), channel(background, 0), 1);
                    gl.glClear(GL.GL_COLOR_BUFFER_BIT);
                    for (View view : views) {
                        Rectangle part = view.camera().window().intersection(tile);
                        if (!part.isEmpty()) {
                            draw(gl, view.scene(), view.camera(), part, tile);
                        }
                    }
                    read(gl, tile, image);
                }
            }
            check(gl, "drawing");
            return image;
        } finally {
            end();
        }
    }

    private void store(GL3 gl, List<View> views) {
        Set<Mesh> wanted = Collections.newSetFromMap(new IdentityHashMap<>());
        for (View view : views) {
            for (Scene.Item item : view.scene().items()) {
                wanted.add(item.mesh());
            }
        }
        stored.entrySet().removeIf(entry -> {
            boolean old = !wanted.contains(entry.getKey());
            if (old) {
                release(gl, entry.getValue());
            }
            return old;
        });
        for (Mesh mesh : wanted) {
            stored.computeIfAbsent(mesh, key -> store(gl, key));
        }
    }

    /** Draws the part of a view that falls on a tile. */
    private void draw(GL3 gl, Scene scene, Camera camera, Rectangle part, Rectangle tile) {
        boolean anyLit = scene.items().stream().anyMatch(item -> item.material().lit());
        double[] light = anyLit ? castShadows(gl, scene) : new double[16];

        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[0]);
        int left = part.x - tile.x;
        int bottom = tile.height - (part.y - tile.y) - part.height;
        gl.glViewport(left, bottom, part.width, part.height);
        gl.glEnable(GL.GL_SCISSOR_TEST);
        gl.glScissor(left, bottom, part.width, part.height);
        gl.glEnable(GL.GL_DEPTH_TEST);
        gl.glDepthFunc(GL.GL_LEQUAL);
        gl.glDepthMask(true);
        gl.glClear(GL.GL_DEPTH_BUFFER_BIT);
        gl.glUseProgram(sceneProgram);
        double[] matrix = camera.matrixOfPart(part);
        matrix(gl, sceneProgram, "view", matrix);
        matrix(gl, sceneProgram, "lightView", light);
        double[] eye = camera.eye();
        gl.glUniform3f(at(gl, sceneProgram, "eye"), (float) eye[0], (float) eye[1], (float) eye[2]);
        Scene.Light lamp = scene.light();
        gl.glUniform3f(at(gl, sceneProgram, "lamp"), (float) lamp.x(), (float) lamp.y(), (float) lamp.z());
        gl.glUniform1f(at(gl, sceneProgram, "entries"), ColourScale.ENTRIES);
        gl.glUniform1i(at(gl, sceneProgram, "scale"), 0);
        gl.glUniform1i(at(gl, sceneProgram, "shadow"), 1);
        gl.glActiveTexture(GL.GL_TEXTURE1);
        gl.glBindTexture(GL.GL_TEXTURE_2D, shadowTexture[0]);
        gl.glActiveTexture(GL.GL_TEXTURE0);
        gl.glBindTexture(GL.GL_TEXTURE_2D, scales.get(ColourScale.PRESSURE));
        gl.glDisable(GL.GL_BLEND);
        items(gl, scene, matrix, false);
        gl.glEnable(GL.GL_BLEND);
        gl.glBlendFuncSeparate(GL.GL_SRC_ALPHA, GL.GL_ONE_MINUS_SRC_ALPHA, GL.GL_ZERO, GL.GL_ONE);
        gl.glDepthMask(false);
        items(gl, scene, matrix, true);
        gl.glDepthMask(true);
        gl.glDisable(GL.GL_BLEND);
        gl.glDisable(GL.GL_SCISSOR_TEST);
        gl.glUseProgram(0);
        gl.glBindVertexArray(0);
    }

    private void items(GL3 gl, Scene scene, double[] matrix, boolean translucent) {
        int turn = at(gl, sceneProgram, "turn");
        int shift = at(gl, sceneProgram, "shift");
        int colour = at(gl, sceneProgram, "colour");
        int opacity = at(gl, sceneProgram, "opacity");
        int gloss = at(gl, sceneProgram, "gloss");
        int lit = at(gl, sceneProgram, "lit");
        int scaled = at(gl, sceneProgram, "scaled");
        for (Scene.Item item : scene.items()) {
            Scene.Material material = item.material();
            if (material.opacity() < 1 != translucent || unseen(matrix, item)) {
                continue;
            }
            int c = material.colour();
            gl.glUniform3f(colour, channel(c, 16), channel(c, 8), channel(c, 0));
            gl.glUniform1f(opacity, (float) material.opacity());
            gl.glUniform1f(gloss, (float) material.gloss());
            gl.glUniform1i(lit, material.lit() ? 1 : 0);
            gl.glUniform1i(scaled, material.scale() != null ? 1 : 0);
            if (material.scale() != null) {
                gl.glBindTexture(GL.GL_TEXTURE_2D, scales.get(material.scale()));
            }
            mesh(gl, turn, shift, item);
        }
    }

    private void mesh(GL3 gl, int turn, int shift, Scene.Item item) {
        Stored mesh = stored.get(item.mesh());
        int first = Math.max(0, 3 * item.from());
        int count = Math.min(mesh.corners, 3 * item.to()) - first;
        if (count <= 0) {
            return;
        }
        gl.glUniform2f(turn, (float) Math.cos(item.turn()), (float) Math.sin(item.turn()));
        double[] d = item.shift();
        gl.glUniform3f(shift, (float) d[0], (float) d[1], (float) d[2]);
        gl.glBindVertexArray(mesh.array);
        gl.glDrawElements(GL.GL_TRIANGLES, count, GL.GL_UNSIGNED_INT, 4L * first);
    }

    /** Whether all of an item lies beyond one side of what the camera sees. */
    private static boolean unseen(double[] m, Scene.Item item) {
        int[] beyond = new int[6];
        for (int corner = 0; corner < 8; corner++) {
            double[] p = corner(item, corner);
            double w = m[3] * p[0] + m[7] * p[1] + m[11] * p[2] + m[15];
            for (int c = 0; c < 3; c++) {
                double d = m[c] * p[0] + m[4 + c] * p[1] + m[8 + c] * p[2] + m[12 + c];
                beyond[2 * c] += d < -w ? 1 : 0;
                beyond[2 * c + 1] += d > w ? 1 : 0;
            }
        }
        for (int count : beyond) {
            if (count == 8) {
                return true;
            }
        }
        return false;
    }

    /** A corner, 0 … 7, of the box round an item in its place. */
    private static double[] corner(Scene.Item item, int corner) {
        float[] box = item.mesh().box();
        double x = box[(corner & 1) == 0 ? 0 : 3];
        double y = box[(corner & 2) == 0 ? 1 : 4];
        double z = box[(corner & 4) == 0 ? 2 : 5];
        double cos = Math.cos(item.turn());
        double sin = Math.sin(item.turn());
        double[] d = item.shift();
        return new double[] {cos * x - sin * y + d[0], sin * x + cos * y + d[1], z + d[2]};
    }

    /** Draws the scene as the lamp sees it, unless that is what the shadow picture shows already. */
    private double[] castShadows(GL3 gl, Scene scene) {
        List<Scene.Item> casters = scene.items().stream()
                .filter(item ->
                        item.casts() && item.material().lit() && item.material().opacity() == 1)
                .toList();
        if (casters.equals(shadowCasters) && scene.light().equals(shadowLight)) {
            return shadowMatrix;
        }
        double[] low = {Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY, Double.POSITIVE_INFINITY};
        double[] high = {Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY, Double.NEGATIVE_INFINITY};
        boolean allPlaced = scene.items().stream().allMatch(Scene.Item::placed);
        for (Scene.Item item : scene.items()) {
            // Small things that move about do not change the light's view from picture to picture.
            if ((item.placed() && !allPlaced) || item.mesh().positions().length == 0) {
                continue;
            }
            for (int corner = 0; corner < 8; corner++) {
                double[] p = corner(item, corner);
                for (int c = 0; c < 3; c++) {
                    low[c] = Math.min(low[c], p[c]);
                    high[c] = Math.max(high[c], p[c]);
                }
            }
        }
        double[] light = Camera.lightMatrix(scene.light(), low, high);
        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[2]);
        gl.glViewport(0, 0, SHADOW, SHADOW);
        gl.glDisable(GL.GL_SCISSOR_TEST);
        gl.glDisable(GL.GL_BLEND);
        gl.glEnable(GL.GL_DEPTH_TEST);
        gl.glDepthFunc(GL.GL_LEQUAL);
        gl.glDepthMask(true);
        gl.glClear(GL.GL_DEPTH_BUFFER_BIT);
        gl.glUseProgram(shadowProgram);
        matrix(gl, shadowProgram, "lightView", light);
        int turn = at(gl, shadowProgram, "turn");
        int shift = at(gl, shadowProgram, "shift");
        for (Scene.Item item : casters) {
            mesh(gl, turn, shift, item);
        }
        shadowCasters = casters;
        shadowLight = scene.light();
        shadowMatrix = light;
        return light;
    }

    private void read(GL3 gl, Rectangle tile, BufferedImage image) {
        int w = tile.width;
        int h = tile.height;
        gl.glBindFramebuffer(GL3.GL_READ_FRAMEBUFFER, framebuffers[0]);
        gl.glBindFramebuffer(GL3.GL_DRAW_FRAMEBUFFER, framebuffers[1]);
        gl.glBlitFramebuffer(0, 0, w, h, 0, 0, w, h, GL.GL_COLOR_BUFFER_BIT, GL.GL_NEAREST);
        gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[1]);
        gl.glPixelStorei(GL.GL_PACK_ALIGNMENT, 4);
        pixels.clear();
        gl.glReadPixels(0, 0, w, h, GL.GL_BGRA, GL3.GL_UNSIGNED_INT_8_8_8_8_REV, pixels);
        int[] rows = ((DataBufferInt) image.getRaster().getDataBuffer()).getData();
        for (int y = 0; y < h; y++) {
            pixels.position((h - 1 - y) * w);
            pixels.get(rows, (tile.y + y) * width + tile.x, w);
        }
    }

    /** How many things OpenGL holds for this canvas: meshes with their buffers, textures, framebuffers, programs. */
    int held() {
        GL3 gl = begin();
        try {
            int count = 0;
            for (int name = 1; name < MOST_NAMES; name++) {
                count += (gl.glIsBuffer(name) ? 1 : 0)
                        + (gl.glIsVertexArray(name) ? 1 : 0)
                        + (gl.glIsTexture(name) ? 1 : 0)
                        + (gl.glIsRenderbuffer(name) ? 1 : 0)
                        + (gl.glIsFramebuffer(name) ? 1 : 0)
                        + (gl.glIsProgram(name) || gl.glIsShader(name) ? 1 : 0);
            }
            return count;
        } finally {
            end();
        }
    }

    /** Names of things of OpenGL are looked at up to here; Mesa gives them out in turn, the lowest free first. */
    private static final int MOST_NAMES = 20_000;

    private static float channel(int colour, int shift) {
        return (colour >> shift & 0xff) / 255f;
    }

    private static int at(GL3 gl, int program, String name) {
        return gl.glGetUniformLocation(program, name);
    }

    private static void matrix(GL3 gl, int program, String name, double[] m) {
        float[] values = new float[16];
        for (int n = 0; n < 16; n++) {
            values[n] = (float) m[n];
        }
        gl.glUniformMatrix4fv(at(gl, program, name), 1, false, values, 0);
    }

    private static void check(GL3 gl, String when) {
        int error = gl.glGetError();
        if (error != GL.GL_NO_ERROR) {
            throw new GLException("OpenGL error 0x" + Integer.toHexString(error) + " while " + when);
        }
    }

    /** Releases everything that OpenGL holds for this canvas. A closed canvas draws no more; closing again is nothing. */
    @Override
    public void close() {
        GLContext context = drawable.getContext();
        if (context == null) {
            return;
        }
        try {
            if (context.makeCurrent() != GLContext.CONTEXT_NOT_CURRENT) {
                release(context.getGL().getGL3());
                context.release();
            }
        } finally {
            drawable.destroy();
        }
    }

    private static void release(GL3 gl, Stored mesh) {
        gl.glDeleteBuffers(mesh.buffers.length, mesh.buffers, 0);
        gl.glDeleteVertexArrays(1, new int[] {mesh.array}, 0);
    }

    private void release(GL3 gl) {
        stored.values().forEach(mesh -> release(gl, mesh));
        stored.clear();
        for (int texture : scales.values()) {
            gl.glDeleteTextures(1, new int[] {texture}, 0);
        }
        scales.clear();
        for (int program : programs) {
            gl.glDeleteProgram(program);
        }
        programs.clear();
        gl.glDeleteTextures(1, shadowTexture, 0);
        gl.glDeleteFramebuffers(3, framebuffers, 0);
        gl.glDeleteRenderbuffers(3, renderbuffers, 0);
    }
}
