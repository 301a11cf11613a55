package org.whither.io.command;

import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FullField;
import org.whither.film.NodalFlow;
import org.whither.film.NodalThinFilm;

/** How the motion of the gas is found between the values of a field. */
enum Interpolation {
    /** Mass is conserved at every point. */
    CONSERVING,
    /** Between the nodes, as they are. */
    NODAL;

    /** The motion of the gas in a film. */
    FilmFlow of(Film film) {
        if (this == CONSERVING) {
            return new ConservingFlow(film);
        }
        return film.field() instanceof FullField ? new NodalFlow(film) : new NodalThinFilm(film);
    }
}
