package org.whither.render;

/**
 * Pictures cannot be drawn on this machine, since OpenGL or the drawing of text cannot be started. Numbers are not
 * affected. The message is one sentence that names what to install; the cause says what failed.
 */
public final class NoOpenGL extends RuntimeException {
    private static final long serialVersionUID = 1L;

    /** What the user is told. */
    static final String SENTENCE =
            "Pictures need software OpenGL and a font, which could not be started on this machine: "
                    + "on Debian or Ubuntu install the packages libegl1 libgl1 libgles2 libxrender1, and for text libfreetype6"
                    + " fontconfig fonts-dejavu-core.";

    /**
     * Pictures cannot be drawn.
     *
     * @param cause what failed
     */
    public NoOpenGL(Throwable cause) {
        super(SENTENCE, cause);
    }
}
