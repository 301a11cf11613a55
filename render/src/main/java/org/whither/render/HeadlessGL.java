package org.whither.render;

import com.jogamp.common.jvm.JNILibLoaderBase;
import com.jogamp.common.os.NativeLibrary;
import com.jogamp.common.os.Platform;
import com.jogamp.common.util.cache.TempJarCache;
import com.jogamp.nativewindow.AbstractGraphicsDevice;
import com.jogamp.opengl.GLCapabilities;
import com.jogamp.opengl.GLDrawableFactory;
import com.jogamp.opengl.GLException;
import com.jogamp.opengl.GLOffscreenAutoDrawable;
import com.jogamp.opengl.GLProfile;
import com.jogamp.opengl.GLRendererQuirks;
import com.jogamp.opengl.egl.EGL;
import java.lang.reflect.Field;
import java.lang.reflect.InvocationTargetException;
import java.lang.reflect.Method;

/**
 * OpenGL with no display and no GPU: EGL's surfaceless platform inside this process, on Mesa's software driver.
 *
 * <p>JOGL chooses its window system once for each JVM, so {@link #start} comes before any other use of JOGL. JOGL 2.6.0's
 * own probing fails on the surfaceless platform for three reasons, which are got round here: it asks for a configuration
 * that can serve a window (the quirk NoSurfacelessCtx is set), it does not load its desktop library on the way through
 * EGL (loaded here), and one quirk makes it ask for OpenGL 2 (GLES3ViaEGLES2Config is put aside). Some of that has no
 * public door, hence the reflection; the version of JOGL is pinned.
 */
final class HeadlessGL extends JNILibLoaderBase {
    /** EGL_PLATFORM_SURFACELESS_MESA, of the EGL extension EGL_MESA_platform_surfaceless. */
    private static final int SURFACELESS = 0x31DD;

    /**
     * System libraries that JOGL needs on Linux. Looked for first: where one is missing, JOGL fails half-way and prints a
     * stack trace when the process ends.
     */
    private static final String[] NEEDED = {"libEGL.so.1", "libGL.so.1", "libGLESv2.so.2", "libXrender.so.1"};

    private static GLDrawableFactory factory;
    private static AbstractGraphicsDevice device;
    private static GLProfile profile;
    private static NoOpenGL failure;

    private HeadlessGL() {}

    /**
     * Starts OpenGL, once; later calls return at once, or fail as the first one did.
     *
     * @throws NoOpenGL where it cannot be started
     */
    static synchronized void start() {
        if (failure != null) {
            throw new NoOpenGL(failure.getCause());
        }
        if (factory != null) {
            return;
        }
        try {
            begin();
        } catch (ReflectiveOperationException | RuntimeException | LinkageError problem) {
            factory = null;
            failure = new NoOpenGL(problem);
            throw failure;
        }
    }

    private static void begin() throws ReflectiveOperationException {
        System.setProperty("nativewindow.ws.name", ".egl");
        // Otherwise AWT starts a display connection of its own, which is fatal where DISPLAY is stale.
        System.setProperty("java.awt.headless", "true");
        Platform.initSingleton();
        ClassLoader loader = HeadlessGL.class.getClassLoader();
        if (Platform.getOSType() == Platform.OSType.LINUX) {
            for (String library : NEEDED) {
                if (NativeLibrary.open(library, true, true, loader, true) == null) {
                    throw new GLException(library + " cannot be loaded");
                }
            }
        }
        set(GLRendererQuirks.class, "_bitmaskOverrideForce", 1 << GLRendererQuirks.NoSurfacelessCtx);
        set(GLRendererQuirks.class, "_bitmaskOverrideIgnore", 1 << GLRendererQuirks.GLES3ViaEGLES2Config);
        if (TempJarCache.isInitialized(true)) {
            addNativeJarLibsJoglCfg(new Class<?>[] {GLProfile.class});
        }
        loadLibrary("jogl_desktop", false, loader);
        GLDrawableFactory.initSingleton();
        long display = EGL.eglGetPlatformDisplay(SURFACELESS, EGL.EGL_DEFAULT_DISPLAY, null);
        if (display == 0) {
            throw new GLException("EGL has no surfaceless platform");
        }
        Class<?> displays = Class.forName("jogamp.opengl.egl.EGLDisplayUtil", true, loader);
        Class<?>[] initialise = {long.class, int[].class, int[].class};
        if (!Boolean.TRUE.equals(call(displays, "eglInitialize", initialise, display, new int[1], new int[1]))) {
            throw new GLException("EGL could not be initialised");
        }
        call(displays, "setSingletonEGLDisplayOnly", new Class<?>[] {boolean.class}, true);
        factory = GLDrawableFactory.getEGLFactory();
        if (factory == null) {
            throw new GLException("JOGL found no EGL");
        }
        call(displays, "eglTerminate", new Class<?>[] {long.class}, display);
        device = factory.getDefaultDevice();
        profile = GLProfile.get(device, new String[] {GLProfile.GL4, GLProfile.GL3}, true);
    }

    /**
     * A drawable whose only use is its context: pictures are drawn into framebuffers of their own.
     *
     * @return an initialised drawable, to be destroyed by the caller
     * @throws NoOpenGL where OpenGL cannot be started
     */
    static GLOffscreenAutoDrawable open() {
        start();
        try {
            GLCapabilities wanted = new GLCapabilities(profile);
            wanted.setOnscreen(false);
            wanted.setPBuffer(true);
            wanted.setHardwareAccelerated(false);
            GLOffscreenAutoDrawable drawable = factory.createOffscreenAutoDrawable(device, wanted, null, 16, 16);
            drawable.display();
            return drawable;
        } catch (GLException problem) {
            throw new NoOpenGL(problem);
        }
    }

    private static void set(Class<?> type, String name, int value) throws ReflectiveOperationException {
        Field field = type.getDeclaredField(name);
        field.setAccessible(true);
        field.setInt(null, value);
    }

    private static Object call(Class<?> type, String name, Class<?>[] parameters, Object... arguments)
            throws ReflectiveOperationException {
        Method method = type.getDeclaredMethod(name, parameters);
        method.setAccessible(true);
        try {
            return method.invoke(null, arguments);
        } catch (InvocationTargetException thrown) {
            throw new ReflectiveOperationException(name + " failed", thrown.getCause());
        }
    }
}
