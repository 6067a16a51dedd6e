package org.merewarden.assessment;

import static org.assertj.core.api.Assertions.assertThat;
import static org.merewarden.assessment.MadeDiagnostics.learned;

import java.util.List;
import java.util.Locale;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.core.inference.Diagnostics;
import org.merewarden.core.inference.Diagnostics.Gathering;
import org.merewarden.core.inference.Diagnostics.Help;
import org.merewarden.core.inference.Diagnostics.Learned;
import org.merewarden.core.prior.Prior;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.context.support.ResourceBundleMessageSource;

class AssessmentWordsTest {
    private final AssessmentWords words = new AssessmentWords(messages());

    static MessageSource messages() {
        ResourceBundleMessageSource messages = new ResourceBundleMessageSource();
        messages.setBasenames("messages/assessment", "messages/common");
        messages.setDefaultEncoding("UTF-8");
        messages.setFallbackToSystemLocale(false);
        return messages;
    }

    @BeforeEach
    void english() {
        LocaleContextHolder.setLocale(Locale.UK);
    }

    @AfterEach
    void reset() {
        LocaleContextHolder.resetLocaleContext();
    }

    private static Diagnostics of(Learned... learned) {
        return new Diagnostics(List.of(learned), List.of(), List.of(), null, List.of());
    }

    @ParameterizedTest
    @CsvSource({
        "0.05, a tenth or less",
        "0.2, about a fifth",
        "0.333, about a third",
        "0.5, about half",
        "0.66, about two thirds",
        "0.8, about four fifths"
    })
    void saysToWhatShareTheRangeWasNarrowed(double share, String fraction) {
        // a lognormal posterior whose log-sd is that share of the prior's
        assertThat(words.taught(of(learned("msy_t", 12, 0.9, 0.9 * share, 0.4))))
                .containsExactly(
                        "The records narrowed the range of MSY to " + fraction + " of what was thought before.");
    }

    @Test
    void saysOfWhatTheRecordsAreSilent() {
        assertThat(words.taught(MadeDiagnostics.typical()))
                .containsExactly(
                        "The records narrowed the range of MSY to about a third of what was thought before.",
                        "Of natural process variation they said next to nothing.");
        Prior scatter = new Prior("observation_sd", 0.2, 0.4, "default", "", "");
        assertThat(words.taught(of(
                        learned("msy_t", 12, 0.9, 0.9, 0.97),
                        learned("harvest_sd", 0.3, 0.5, 0.2, 0.4),
                        learned("fmsy", 0.3, 0.5, 0.5, 0.92),
                        learned("process_sd", 0.1, 0.4, 0.4, 0.91),
                        new Learned(scatter, "nets", 0.1, 0.2, 0.4, 0.99))))
                .containsExactly(
                        "The records said next to nothing of MSY: it is what was thought before them.",
                        "Of FMSY, natural process variation and the scatter of nets they said next to nothing.");
    }

    @Test
    void saysWhereTheRecordsContradictWhatWasThought() {
        // 80 % of N(ln 12, 0.5) lie between 12 e^(−0.64) = 6.3 and 12 e^0.64 = 22.8
        Prior prior = new Prior("msy_t", 12, 0.5, "", "", "");
        assertThat(words.taught(of(new Learned(prior, "", 4, 6, 9, 0.2))))
                .singleElement()
                .asString()
                .endsWith("They put it lower than was thought likely.");
        assertThat(words.taught(of(new Learned(prior, "", 20, 23, 26, 0.1))))
                .singleElement()
                .asString()
                .endsWith("They put it higher than was thought likely.");
        assertThat(words.taught(of(new Learned(prior, "", 8, 22, 60, 0.5))))
                .containsExactly("The records moved MSY, but left it about as uncertain as it was thought before.");
    }

    @Test
    void saysInOneSentenceThatNothingWasLearnedAtAll() {
        assertThat(words.taught(of(learned("msy_t", 12, 0.9, 0.9, 1.0), learned("shape", 1, 0, 0, null))))
                .containsExactly("The records taught next to nothing: the results are what was thought before them.");
    }

    @Test
    void saysNothingWithoutDiagnostics() {
        assertThat(words.taught(Diagnostics.NONE)).isEmpty();
        assertThat(words.helps(Diagnostics.NONE)).isEmpty();
    }

    @Test
    void saysWhatFurtherEvidenceWouldDo() {
        assertThat(words.helps(MadeDiagnostics.typical()))
                .containsExactly(
                        "One estimate of the biomass at the start of the coming season, by mark–recapture for instance,"
                                + " would narrow the range of the coming season’s catch at FMSY by about 18%.",
                        "One more value of nets would hardly narrow the coming season’s catch at FMSY.");
        for (Gathering gathering : Gathering.values()) {
            Diagnostics one =
                    new Diagnostics(List.of(), List.of(), List.of(), null, List.of(new Help(gathering, "nets", 0.1)));
            assertThat(words.helps(one)).singleElement().asString().contains("about 10%");
        }
    }

    @Test
    void saysHowMuchOfAParameterIsLearned() {
        assertThat(words.overlap(0.95)).isEqualTo("next to nothing (95%)");
        assertThat(words.overlap(0.75)).isEqualTo("a little (75%)");
        assertThat(words.overlap(0.5)).isEqualTo("much (50%)");
        assertThat(words.overlap(0.1)).isEqualTo("nearly all (10%)");
        assertThat(words.overlap(null)).isEqualTo("not estimated");
    }
}
