package org.whither.io.command;

import java.nio.file.Path;
import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FullField;
import org.whither.film.NodalFlow;
import org.whither.io.file.RefusedInput;

/** How the motion of the gas is found between the values of a field. */
enum Interpolation {
    /** Mass is conserved at every point. */
    CONSERVING,
    /** Between the nodes, as they are. */
    NODAL;

    /** The motion of the gas in the film of a file; refused where its field does not have what this needs. */
    FilmFlow of(Film film, Path file) {
        if (this == CONSERVING) {
            return new ConservingFlow(film);
        }
        if (!(film.field() instanceof FullField)) {
            throw RefusedInput.of(
                    file,
                    "/field has no velocities",
                    "those of a full field, which --interpolation nodal needs",
                    "leave the option out for this file");
        }
        return new NodalFlow(film);
    }
}
