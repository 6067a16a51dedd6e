package org.merewarden.advice;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.inference.Quantiles;
import org.merewarden.core.outlook.Course;
import org.merewarden.core.outlook.Outlook;
import org.merewarden.core.policy.RampCourse;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.springframework.stereotype.Component;

/** The courses that a decision chooses between, projected on the same draws and process errors. */
@Component
class Alternatives {
    private final Texts texts;

    Alternatives(Texts texts) {
        this.texts = texts;
    }

    /** Closure, last season's limit, the recommendation, a constant F, the rule every year, MSY, the reader's own. */
    List<Alternative> of(AdviceWorking working, WhatIf ask) {
        Outlook outlook = working.outlook();
        double recommended = working.recommendation().limitTonnes();
        double before = working.earlier().limitTonnes();
        double msy = Quantiles.of(outlook.posterior().msyTonnes(), 0.5);
        List<Alternative> all = new ArrayList<>();
        all.add(held(outlook, texts.of("outlook.alternative.closure"), 0));
        if (recommended > 0) {
            all.add(held(outlook, texts.of("outlook.alternative.recommended"), recommended));
        }
        if (before > 0 && before != recommended) {
            all.add(held(outlook, texts.of("outlook.alternative.before"), before));
        }
        all.add(constantMortality(working));
        all.add(alternative(
                outlook, texts.of("outlook.alternative.rule"), null, new RampCourse(working.policy(), outlook), null));
        all.add(held(outlook, texts.of("outlook.alternative.msy"), msy));
        Double own = ask.ownTonnes();
        if (own != null) {
            all.add(held(outlook, texts.of("outlook.alternative.own", Figures.decided(own)), own));
        }
        return all;
    }

    private static Alternative held(Outlook outlook, String name, double tonnes) {
        return alternative(outlook, name, tonnes, Course.ofCatch(tonnes), outlook.collapseCourse(tonnes));
    }

    private Alternative constantMortality(AdviceWorking working) {
        Outlook outlook = working.outlook();
        double share = working.policy().ramp().targetFraction();
        double[] mortality = Arrays.stream(outlook.posterior().fmsyPerYear())
                .map(fmsy -> share * fmsy)
                .toArray();
        // held for ever, F at or above g′(0) = r/n is a collapse course; a share of FMSY never is
        return alternative(
                outlook,
                texts.of("outlook.alternative.mortality", Figures.setPercent(share)),
                null,
                Course.ofMortality(mortality),
                0.0);
    }

    private static Alternative alternative(
            Outlook outlook, String name, @Nullable Double tonnes, Course course, @Nullable Double collapse) {
        var projection = outlook.project(course);
        double first = IntStream.range(0, outlook.draws())
                .mapToDouble(i -> projection.catchTonnes()[i][0])
                .average()
                .orElseThrow();
        return new Alternative(name, tonnes, course, projection, first, collapse);
    }
}
