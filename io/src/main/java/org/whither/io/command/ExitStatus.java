package org.whither.io.command;

/** Exit statuses of the program. */
final class ExitStatus {
    static final int DONE = 0;
    static final int FAULT = 1;
    static final int USAGE = 2;
    static final int REFUSED = 3;
    /** Done, but the wanted width or closure was not reached, or pictures could not be drawn. */
    static final int SHORT_OF_WANTED = 4;

    private ExitStatus() {}
}
