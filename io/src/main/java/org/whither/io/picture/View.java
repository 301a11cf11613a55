package org.whither.io.picture;

import java.util.Locale;

/** The kinds of still pictures. */
public enum View {
    /** The face seen along the shaft. */
    PLAN,
    /** The pressure as height. */
    RELIEF,
    /** Inside the film. */
    GAP,
    /** A section in the (r, z) plane. */
    MERIDIAN;

    /** As it is written in options and files. */
    public String word() {
        return name().toLowerCase(Locale.ROOT);
    }
}
