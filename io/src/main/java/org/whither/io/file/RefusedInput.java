package org.whither.io.file;

import java.nio.file.Path;

/**
 * What the user gave cannot be used. The message is one sentence for the user: which file, which part of it, what was
 * found and expected, and how to mend it. No stack trace is needed to understand it.
 */
public final class RefusedInput extends RuntimeException {
    private static final long serialVersionUID = 1L;

    /**
     * A refusal.
     *
     * @param sentence what is said to the user
     */
    public RefusedInput(String sentence) {
        super(sentence);
    }

    /**
     * A refusal that follows from another failure.
     *
     * @param sentence what is said to the user
     * @param cause the failure behind it, for the developer
     */
    public RefusedInput(String sentence, Throwable cause) {
        super(sentence, cause);
    }

    /**
     * A refusal in the usual order of its parts.
     *
     * @param file the file that is refused
     * @param found which part of it, and what is there, such as "/grid/radius[3] is -0.05 m"
     * @param expected what should be there
     * @param mend what the user can do about it
     */
    public static RefusedInput of(Path file, String found, String expected, String mend) {
        return new RefusedInput(sentence(file, found, expected, mend));
    }

    /** As {@link #of(Path, String, String, String)}, with the failure behind it. */
    public static RefusedInput of(Path file, String found, String expected, String mend, Throwable cause) {
        return new RefusedInput(sentence(file, found, expected, mend), cause);
    }

    private static String sentence(Path file, String found, String expected, String mend) {
        return file + ": " + found + "; expected " + expected + "; " + mend + ".";
    }
}
