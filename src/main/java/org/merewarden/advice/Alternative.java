package org.merewarden.advice;

import org.jspecify.annotations.Nullable;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Projection;

/**
 * A course of fishing set beside the others.
 *
 * @param name in the reader's language
 * @param tonnes the constant catch, t/yr; null where the course is none
 * @param firstCatch expected removals of the first season, t
 * @param collapseCourse 0–1; null where the course adapts to biomass and has none
 */
record Alternative(
        String name,
        @Nullable Double tonnes,
        Course course,
        Projection projection,
        double firstCatch,
        @Nullable Double collapseCourse) {}
