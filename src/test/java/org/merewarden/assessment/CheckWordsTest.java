package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.assessment.MadeDiagnostics.retrospective;
import static org.merewarden.assessment.MadeDiagnostics.survey;

import java.util.List;
import java.util.Locale;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.merewarden.core.inference.Diagnostics.Kind;
import org.merewarden.core.inference.Diagnostics.Retrospective;
import org.merewarden.core.inference.Diagnostics.SeriesCheck;
import org.springframework.context.i18n.LocaleContextHolder;

class CheckWordsTest {
    private final CheckWords words = new CheckWords(new Texts(AssessmentWordsTest.messages()));

    @BeforeEach
    void english() {
        LocaleContextHolder.setLocale(Locale.UK);
    }

    @AfterEach
    void reset() {
        LocaleContextHolder.resetLocaleContext();
    }

    private String met(SeriesCheck check) {
        return words.series(check).get(0);
    }

    @Test
    void aSeriesThatIsMetWellIsSaidToBe() {
        assertThat(words.series(survey(10, 0.1, 1.0, 0.6, 0.2, 0.7)))
                .containsExactly(
                        "It is met as well as its scatter allows, and shows no pattern (residuals’ sd 1; somewhat under 1 is"
                                + " usual, because the path of the biomass leans towards the values).",
                        "One season ahead the model missed it by 0.7 times what “same as last time” would have (5"
                                + " predictions): it foresees this series.",
                        "Its largest value is 2.1 times its smallest: some contrast to learn from.");
    }

    @Test
    void eachDisorderOfTheResidualsHasItsSentence() {
        assertThat(met(survey(10, 0.1, 1.0, 0.02, 0.6, 0.7)))
                .contains("keep to one side")
                .contains("2%");
        assertThat(met(survey(10, 0.1, 1.0, 0.02, -0.6, 0.7))).contains("change sides");
        // the mean of 16 values with sd 1 has standard error 0.25
        assertThat(met(survey(16, 0.6, 1.0, 0.5, 0.1, 0.7))).contains("above what the model expects");
        assertThat(met(survey(16, -0.6, 1.0, 0.5, 0.1, 0.7))).contains("below what the model expects");
        assertThat(met(survey(16, 0.4, 1.0, 0.5, 0.1, 0.7))).contains("met as well");
        assertThat(met(survey(2, 0.4, null, null, null, null))).contains("too few values");
    }

    @Test
    void scatterIsJudgedByTheChiSquaredDistribution() {
        // table of χ² with 9 degrees of freedom: 5 % 3.325, 95 % 16.919; √(3.325/9) = 0.608, √(16.919/9) = 1.371
        assertThat(met(survey(10, 0.0, 1.36, 0.5, 0.1, 0.7))).contains("met as well");
        assertThat(met(survey(10, 0.0, 1.38, 0.5, 0.1, 0.7))).contains("1.38 times as widely");
        assertThat(met(survey(10, 0.0, 0.62, 0.5, 0.1, 0.7))).contains("met as well");
        assertThat(met(survey(10, 0.0, 0.60, 0.5, 0.1, 0.7))).contains("met as well");
    }

    @Test
    void aModelThatForeseesNothingIsNotTrusted() {
        assertThat(words.series(survey(10, 0.1, 1.0, 0.6, 0.2, 1.51)).get(1)).contains("do not trust");
        assertThat(words.series(survey(10, 0.1, 1.0, 0.6, 0.2, 1.5)).get(1))
                .contains("about as well as that")
                .doesNotContain("trust");
        assertThat(words.series(survey(10, 0.1, 1.0, 0.6, 0.2, null)).get(1)).contains("too few seasons");
    }

    private static SeriesCheck influencing(String name, Double without, Double with) {
        return new SeriesCheck(
                name, Kind.INDEX, 10, null, null, null, null, null, null, 0, without, with, without, with);
    }

    @Test
    void namesTheSeriesOnWhichMostHangs() {
        assertThat(words.influence(List.of(influencing("nets", 12.6, 12.5), influencing("traps", 20.0, 12.5))))
                .singleElement()
                .asString()
                .startsWith("MSY hangs on traps: without it MSY would be 20 instead of 12.5\u00a0t");
        assertThat(words.influence(List.of(influencing("nets", 10.5, 12.5))))
                .singleElement()
                .asString()
                .startsWith("MSY leans on nets");
        assertThat(words.influence(List.of(influencing("nets", 12.6, 12.5))))
                .singleElement()
                .asString()
                .startsWith("MSY hangs on no series alone");
        assertThat(words.influence(List.of(influencing("nets", null, 12.5)))).isEmpty();
    }

    /** 12.5 → 9.6 is −23 %, though 12.5/9.6 is +30 %: the check counts from the result with all series. */
    @Test
    void influenceIsJudgedByTheChecksOwnMeasure() {
        assertThat(words.influence(List.of(influencing("nets", 9.6, 12.5))))
                .singleElement()
                .asString()
                .startsWith("MSY leans");
        assertThat(words.influence(List.of(influencing("nets", 9.3, 12.5))))
                .singleElement()
                .asString()
                .startsWith("MSY hangs on nets");
    }

    @Test
    void aChangeOfRelativeBiomassAloneIsInformation() {
        SeriesCheck traps =
                new SeriesCheck("traps", Kind.INDEX, 10, null, null, null, null, null, null, 0, 12.6, 12.5, 0.4, 0.8);
        assertThat(words.influence(List.of(influencing("nets", 14.0, 12.5), traps)))
                .hasSize(2)
                .noneMatch(s -> s.contains("Be sure"))
                .last()
                .isEqualTo("B/BMSY changes most without traps: 0.4 instead of 0.8.");
        assertThat(words.influence(List.of(traps)))
                .singleElement()
                .asString()
                .startsWith("MSY hangs on no series alone")
                .contains("B/BMSY 0.4 instead of 0.8");
    }

    @Test
    void mohnsRhoSaysWhichWayTheLastFigureErrs() {
        assertThat(words.retrospective(retrospective(0.12)))
                .isEqualTo("Over 2 seasons taken away, earlier results put B/BMSY 12% higher on average than all"
                        + " records do: steady.");
        assertThat(words.retrospective(retrospective(-0.05)))
                .contains("5% lower")
                .endsWith("steady.");
        assertThat(words.retrospective(new Retrospective(retrospective(0).peels(), 0.5, 0.1, 0)))
                .endsWith("steady.");
        assertThat(words.retrospective(retrospective(0.4))).contains("probably too high");
        assertThat(words.retrospective(retrospective(-0.19))).endsWith("steady.");
        assertThat(words.retrospective(retrospective(-0.3))).contains("probably too low");
    }
}
