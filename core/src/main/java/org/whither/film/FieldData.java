package org.whither.film;

/** What a solver computed of the film: a {@link FullField} or a {@link LubricationField}. */
public sealed interface FieldData permits FullField, LubricationField {}
