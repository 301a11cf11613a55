package org.whither.render;

import com.jogamp.common.nio.Buffers;
import com.jogamp.opengl.GL;
import com.jogamp.opengl.GL3;
import com.jogamp.opengl.GLOffscreenAutoDrawable;
import java.awt.image.BufferedImage;
import java.nio.ByteBuffer;
import java.nio.FloatBuffer;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.whither.film.Face;
import org.whither.film.Frame;
import org.whither.trace.Path;

/**
 * How long the whole ring takes, of a million triangles with 200 tubes, 1280 × 720 with four samples a pixel: against a
 * bare draw of the same triangles (light and colour map, no shadow), both from meshes that OpenGL has already, in the same
 * run. {@code RingBenchmark [frames]}; prints medians.
 */
final class RingBenchmark {
    private static final int WIDTH = 1280;
    private static final int HEIGHT = 720;

    private RingBenchmark() {}

    public static void main(String[] arguments) {
        int frames = arguments.length > 0 ? Integer.parseInt(arguments[0]) : 15;
        SpiralFilm film = new SpiralFilm(12, 12000 * Math.PI / 30, true, Face.STATOR, 6);
        List<Path> paths = new ArrayList<>();
        SpiralFilm coarse = new SpiralFilm();
        for (int n = 0; n < 200; n++) {
            double r = SpiralFilm.FEED_FROM + (SpiralFilm.FEED_TO - SpiralFilm.FEED_FROM) * (n % 10 + 0.5) / 10;
            paths.add(coarse.path(2 * Math.PI * n / 200, r, 0.25 + 0.5 * (n % 7) / 7, Frame.ROTATING));
        }
        PictureSettings settings = PictureSettings.standard("Benchmark");
        ReliefSettings relief = ReliefSettings.ring(settings);
        Relief.Layout layout = Relief.layout(film, paths, relief);
        ReliefScene ring = layout.scene();
        List<Scene.Item> items = new ArrayList<>(ring.surface());
        items.addAll(ring.tubes(paths, layout.speeds()));
        long triangles = items.stream()
                .mapToLong(item -> item.mesh().triangles().length / 3)
                .sum();
        System.out.printf("%d triangles in %d meshes, %d tubes%n", triangles, items.size(), paths.size());
        Scene.Light light = Relief.light(-Math.PI / 2);

        double[] bare = new double[frames];
        double[] ours = new double[frames];
        double[] still = new double[frames];
        Bare plain = new Bare(items, layout.camera, light);
        try (Canvas canvas = new Canvas(WIDTH, HEIGHT)) {
            for (int n = -3; n < frames; n++) {
                long start = System.nanoTime();
                plain.draw();
                long middle = System.nanoTime();
                List<Scene.Item> all = new ArrayList<>(items);
                all.addAll(ring.lines());
                // A camera of its own for each frame, as in an animation; the shadows stay.
                BufferedImage image =
                        canvas.draw(0xffffff, List.of(new Canvas.View(new Scene(all, light), layout.camera)));
                long end = System.nanoTime();
                if (n >= 0) {
                    bare[n] = 1e-6 * (middle - start);
                    ours[n] = 1e-6 * (end - middle);
                }
                if (image.getRGB(0, 0) == 0) {
                    throw new IllegalStateException("nothing was drawn");
                }
            }
            for (int n = 0; n < frames; n++) {
                // Another light each time: with the shadows drawn anew, as for a single picture.
                long start = System.nanoTime();
                canvas.draw(
                        0xffffff,
                        List.of(new Canvas.View(new Scene(items, Relief.light(-1.5 - 1e-3 * n)), layout.camera)));
                still[n] = 1e-6 * (System.nanoTime() - start);
            }
        }
        plain.close();
        System.out.printf(
                "bare draw %.0f ms; ring with lines and shadows %.0f ms (%.2f times); with new shadows %.0f ms (%.2f)%n",
                median(bare), median(ours), median(ours) / median(bare), median(still), median(still) / median(bare));
    }

    private static double median(double[] values) {
        Arrays.sort(values);
        return values[values.length / 2];
    }

    /** The same triangles with nothing but light and a colour map. */
    private static final class Bare {
        private static final String VERTEX = "#version 330 core\n"
                + "layout(location = 0) in vec3 position; layout(location = 1) in vec3 normal;\n"
                + "layout(location = 2) in float value; uniform mat4 view; uniform vec2 turn;\n"
                + "out vec3 facing; out vec3 place; out float number;\n"
                + "vec3 turned(vec3 v) { return vec3(turn.x*v.x - turn.y*v.y, turn.y*v.x + turn.x*v.y, v.z); }\n"
                + "void main() { place = turned(position); facing = turned(normal); number = value;\n"
                + " gl_Position = view * vec4(place, 1.0); }\n";
        private static final String FRAGMENT = "#version 330 core\n"
                + "in vec3 facing; in vec3 place; in float number; uniform vec3 lamp; uniform vec3 eye;\n"
                + "uniform sampler2D scale; out vec4 pixel;\n"
                + "void main() { vec3 n = normalize(facing); vec3 v = normalize(eye - place);\n"
                + " float d = max(0.0, dot(n, lamp)); float s = pow(max(0.0, dot(n, normalize(lamp + v))), 32.0);\n"
                + " pixel = vec4(texture(scale, vec2(number, 0.5)).rgb * (0.3 + 0.7 * d) + 0.2 * s, 1.0); }\n";

        private final GLOffscreenAutoDrawable drawable = HeadlessGL.open();
        private final List<Scene.Item> items;
        private final java.util.IdentityHashMap<Mesh, int[]> arrays = new java.util.IdentityHashMap<>();
        private final int[] framebuffers = new int[2];
        private final ByteBuffer pixels = Buffers.newDirectByteBuffer(4 * WIDTH * HEIGHT);
        private final int program;

        Bare(List<Scene.Item> items, Camera camera, Scene.Light light) {
            this.items = items;
            GL3 gl = begin();
            int[] buffers = new int[3];
            gl.glGenFramebuffers(2, framebuffers, 0);
            gl.glGenRenderbuffers(3, buffers, 0);
            int[] formats = {GL.GL_RGBA8, GL.GL_DEPTH_COMPONENT24, GL.GL_RGBA8};
            for (int n = 0; n < 3; n++) {
                gl.glBindRenderbuffer(GL.GL_RENDERBUFFER, buffers[n]);
                gl.glRenderbufferStorageMultisample(GL.GL_RENDERBUFFER, n < 2 ? 4 : 0, formats[n], WIDTH, HEIGHT);
                gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[n / 2]);
                gl.glFramebufferRenderbuffer(
                        GL.GL_FRAMEBUFFER,
                        n == 1 ? GL.GL_DEPTH_ATTACHMENT : GL.GL_COLOR_ATTACHMENT0,
                        GL.GL_RENDERBUFFER,
                        buffers[n]);
            }
            program = gl.glCreateProgram();
            for (int n = 0; n < 2; n++) {
                int shader = gl.glCreateShader(n == 0 ? GL3.GL_VERTEX_SHADER : GL3.GL_FRAGMENT_SHADER);
                gl.glShaderSource(shader, 1, new String[] {n == 0 ? VERTEX : FRAGMENT}, null);
                gl.glCompileShader(shader);
                gl.glAttachShader(program, shader);
            }
            gl.glLinkProgram(program);
            gl.glUseProgram(program);
            float[] matrix = new float[16];
            for (int n = 0; n < 16; n++) {
                matrix[n] = (float) camera.matrix()[n];
            }
            gl.glUniformMatrix4fv(gl.glGetUniformLocation(program, "view"), 1, false, matrix, 0);
            gl.glUniform3f(
                    gl.glGetUniformLocation(program, "lamp"), (float) light.x(), (float) light.y(), (float) light.z());
            double[] eye = camera.eye();
            gl.glUniform3f(gl.glGetUniformLocation(program, "eye"), (float) eye[0], (float) eye[1], (float) eye[2]);
            int[] texture = new int[1];
            gl.glGenTextures(1, texture, 0);
            gl.glBindTexture(GL.GL_TEXTURE_2D, texture[0]);
            ByteBuffer texels = Buffers.newDirectByteBuffer(4 * ColourScale.ENTRIES);
            for (int colour : ColourScale.PRESSURE.table()) {
                texels.put((byte) (colour >> 16))
                        .put((byte) (colour >> 8))
                        .put((byte) colour)
                        .put((byte) 255);
            }
            texels.rewind();
            gl.glTexImage2D(
                    GL.GL_TEXTURE_2D,
                    0,
                    GL.GL_RGBA8,
                    ColourScale.ENTRIES,
                    1,
                    0,
                    GL.GL_RGBA,
                    GL.GL_UNSIGNED_BYTE,
                    texels);
            gl.glTexParameteri(GL.GL_TEXTURE_2D, GL.GL_TEXTURE_MIN_FILTER, GL.GL_LINEAR);
            for (Scene.Item item : items) {
                arrays.computeIfAbsent(item.mesh(), mesh -> store(gl, mesh));
            }
            drawable.getContext().release();
        }

        private GL3 begin() {
            drawable.getContext().makeCurrent();
            return drawable.getContext().getGL().getGL3();
        }

        private static int[] store(GL3 gl, Mesh mesh) {
            int[] array = new int[1];
            int[] buffers = new int[4];
            gl.glGenVertexArrays(1, array, 0);
            gl.glBindVertexArray(array[0]);
            gl.glGenBuffers(4, buffers, 0);
            float[][] data = {mesh.positions(), mesh.normals(), mesh.values()};
            for (int n = 0; n < 3; n++) {
                FloatBuffer values = Buffers.newDirectFloatBuffer(data[n]);
                gl.glBindBuffer(GL.GL_ARRAY_BUFFER, buffers[n]);
                gl.glBufferData(GL.GL_ARRAY_BUFFER, 4L * data[n].length, values, GL.GL_STATIC_DRAW);
                gl.glEnableVertexAttribArray(n);
                gl.glVertexAttribPointer(n, n < 2 ? 3 : 1, GL.GL_FLOAT, false, 0, 0);
            }
            gl.glBindBuffer(GL.GL_ELEMENT_ARRAY_BUFFER, buffers[3]);
            gl.glBufferData(
                    GL.GL_ELEMENT_ARRAY_BUFFER,
                    4L * mesh.triangles().length,
                    Buffers.newDirectIntBuffer(mesh.triangles()),
                    GL.GL_STATIC_DRAW);
            return new int[] {array[0], mesh.triangles().length};
        }

        void draw() {
            GL3 gl = begin();
            gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[0]);
            gl.glViewport(0, 0, WIDTH, HEIGHT);
            gl.glEnable(GL.GL_DEPTH_TEST);
            gl.glClearColor(1, 1, 1, 1);
            gl.glClear(GL.GL_COLOR_BUFFER_BIT | GL.GL_DEPTH_BUFFER_BIT);
            gl.glUseProgram(program);
            int turn = gl.glGetUniformLocation(program, "turn");
            for (Scene.Item item : items) {
                int[] array = arrays.get(item.mesh());
                gl.glUniform2f(turn, (float) Math.cos(item.turn()), (float) Math.sin(item.turn()));
                gl.glBindVertexArray(array[0]);
                gl.glDrawElements(GL.GL_TRIANGLES, array[1], GL.GL_UNSIGNED_INT, 0);
            }
            gl.glBindFramebuffer(GL3.GL_READ_FRAMEBUFFER, framebuffers[0]);
            gl.glBindFramebuffer(GL3.GL_DRAW_FRAMEBUFFER, framebuffers[1]);
            gl.glBlitFramebuffer(0, 0, WIDTH, HEIGHT, 0, 0, WIDTH, HEIGHT, GL.GL_COLOR_BUFFER_BIT, GL.GL_NEAREST);
            gl.glBindFramebuffer(GL.GL_FRAMEBUFFER, framebuffers[1]);
            gl.glReadPixels(0, 0, WIDTH, HEIGHT, GL.GL_RGBA, GL.GL_UNSIGNED_BYTE, pixels);
            drawable.getContext().release();
        }

        void close() {
            drawable.destroy();
        }
    }
}
