package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;

import java.time.Instant;
import java.time.LocalDate;
import java.util.Locale;
import java.util.TimeZone;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.springframework.context.i18n.LocaleContextHolder;

/** Expected texts are written by hand from the manners of the product: three digits, intervals, frequencies. */
class FiguresTest {
    @BeforeEach
    void reader() {
        LocaleContextHolder.setLocale(Locale.UK);
    }

    @AfterEach
    void nobody() {
        LocaleContextHolder.resetLocaleContext();
    }

    @ParameterizedTest
    @CsvSource({
        "12.44, 12.4",
        "12.0, 12",
        "0.045678, 0.0457",
        "'1234.4', '1,230'",
        "'98765432', '98,800,000'",
        "0, 0",
        "-3.14159, -3.14",
        "999.6, '1,000'",
        "0.0001, 0.0001",
        "0.00009999, 0.0001",
        "0.0000231, 2.31\u00a0×\u00a010⁻⁵",
        "-0.00000000000123, -1.23\u00a0×\u00a010⁻¹²"
    })
    void threeSignificantDigits(double value, String text) {
        assertThat(Figures.sig(value)).isEqualTo(text);
    }

    @Test
    void separatorsFollowTheReader() {
        LocaleContextHolder.setLocale(Locale.GERMANY);
        assertThat(Figures.sig(12.44)).isEqualTo("12,4");
        assertThat(Figures.sig(1234.4)).isEqualTo("1.230");
    }

    @Test
    void theUnknownIsADash() {
        assertThat(Figures.sig(null)).isEqualTo("—");
        assertThat(Figures.sig(Double.NaN)).isEqualTo("—");
        assertThat(Figures.tonnes(null)).isEqualTo("—");
        assertThat(Figures.percent(Double.NaN)).isEqualTo("—");
        assertThat(Figures.chances(null)).isEqualTo("—");
        assertThat(Figures.date(null)).isEqualTo("—");
        assertThat(Figures.dateTime(null)).isEqualTo("—");
    }

    @Test
    void tonnesStayWithTheirUnitOnOneLine() {
        assertThat(Figures.tonnes(12.44)).isEqualTo("12.4\u00a0t");
    }

    @Test
    void whatIsDecidedIsToldToTheKilogram() {
        assertThat(Figures.decided(12.345)).isEqualTo("12.345\u00a0t");
        assertThat(Figures.decided(1200.0, "net-nights")).isEqualTo("1,200\u00a0net-nights");
        assertThat(Figures.decidedFigure(0.5)).isEqualTo("0.5");
        assertThat(Figures.decided(null)).isEqualTo("—");
        assertThat(Figures.decided(Double.NaN, "t")).isEqualTo("—");
    }

    @Test
    void whatIsSetKeepsItsDecimals() {
        assertThat(Figures.setPercent(0.075)).isEqualTo("7.5%");
        assertThat(Figures.setPercent(0.1)).isEqualTo("10%");
        assertThat(Figures.setPercent(0.0725)).isEqualTo("7.25%");
        assertThat(Figures.setPercent(null)).isEqualTo("—");
    }

    @Test
    void aChanceIsNeverRoundedToTheOtherSideOfItsBound() {
        assertThat(Figures.percentBeside(0.104, 0.1)).isEqualTo("10.4%");
        assertThat(Figures.percentBeside(0.1001, 0.1)).isEqualTo("10.1%");
        assertThat(Figures.percentBeside(0.1, 0.1)).isEqualTo("10%");
        assertThat(Figures.percentBeside(0.096, 0.1)).isEqualTo("10%");
        assertThat(Figures.percentBeside(0.13, 0.1)).isEqualTo("13%");
        assertThat(Figures.percentBeside(0.0749, 0.075)).isEqualTo("7%");
        assertThat(Figures.percentBeside(0.0751, 0.075)).isEqualTo("8%");
        assertThat(Figures.percentBeside(0.0755, 0.0758)).isEqualTo("7.55%");
        assertThat(Figures.percentBeside(0.0726, 0.0725)).isEqualTo("7.3%");
        assertThat(Figures.percentBeside(Double.NaN, 0.1)).isEqualTo("—");
    }

    @Test
    void intervals() {
        assertThat(Figures.interval(12.4, 8.1, 19.0)).isEqualTo("12.4 (8.1–19)");
        assertThat(Figures.interval(12.4, null, 19.0)).isEqualTo("12.4");
        assertThat(Figures.interval(null, 1.0, 2.0)).isEqualTo("—");
    }

    @ParameterizedTest
    @CsvSource({"0.8, 80%", "0, 0%", "1, 100%", "0.001, <1%", "0.999, >99%", "-0.123, -12%", "0.005, 0%", "1.2, 120%"})
    void percent(double share, String text) {
        assertThat(Figures.percent(share)).isEqualTo(text);
    }

    @ParameterizedTest
    @CsvSource({
        "0.1667, about 1 of 6 cases",
        "0.11, about 1 of 9 cases",
        "0.5, about 1 of 2 cases",
        "0.6, about 3 of 5 cases",
        "0.83, about 5 of 6 cases",
        "0.04, about 1 of 25 cases",
        "0.0123, about 1 of 81 cases",
        "0.97, about 32 of 33 cases",
        "0.0005, 'fewer than 1 of 1,000 cases'",
        "0.9999, 'more than 999 of 1,000 cases'",
        "0, none of the cases",
        "1, all cases"
    })
    void chancesAsFrequencies(double probability, String text) {
        assertThat(Figures.chances(probability)).isEqualTo(text);
    }

    /** Between a tenth and nine tenths the picture is never more than three points off; the law holds for every per mille. */
    @Test
    void chancesAreCloseToTheProbability() {
        for (int i = 100; i <= 900; i++) {
            String[] words = Figures.chances(i / 1000.0).split(" ");
            double said = Double.parseDouble(words[1]) / Double.parseDouble(words[3]);
            assertThat(said).as(String.join(" ", words)).isBetween(i / 1000.0 - 0.03, i / 1000.0 + 0.03);
        }
    }

    @Test
    void datesAndMomentsInTheReadersWordsAndTheOfficesTime() {
        LocaleContextHolder.setTimeZone(TimeZone.getTimeZone("America/Winnipeg"));
        assertThat(Figures.date(LocalDate.of(2026, 9, 3))).isEqualTo("3 Sept 2026");
        assertThat(Figures.dateTime(Instant.parse("2026-09-03T03:05:00Z"))).isEqualTo("2 Sept 2026, 22:05");
    }

    @Test
    void soManyDigitsWithThousandsApart() {
        assertThat(Figures.digits(1234567.891, 6)).isEqualTo("1,234,570");
        assertThat(Figures.digits(12.34567891, 6)).isEqualTo("12.3457");
        assertThat(Figures.digits(0.00001234567, 6)).isEqualTo("1.23457\u00a0×\u00a010⁻⁵");
        assertThat(Figures.digits(Double.NaN, 6)).isEqualTo(Figures.UNKNOWN);
    }
}
