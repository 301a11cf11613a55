package org.whither.samples;

import org.whither.film.Film;

/**
 * A computed sample.
 *
 * @param film the film
 * @param facts how well it was solved, and its figures as a whole
 */
public record SolvedFilm(Film film, SolverFacts facts) {}
