package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;

import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.junit.jupiter.params.provider.ValueSource;

class TextsTest {
    @ParameterizedTest
    @CsvSource(
            delimiter = ';',
            value = {"12.5;12.5", "12,5;12.5", "0;0", "0,125;0.125", "1250;1250", " 7 ;7"})
    void pointAndCommaAreDecimalMarks(String typed, double kilograms) {
        assertThat(Texts.decimal(typed)).contains(kilograms);
    }

    @ParameterizedTest
    @ValueSource(strings = {"1,250", "12,500", "-3", "NaN", "1e3", "1.250,5", "twelve", "", "9999999999999"})
    void whatCouldMeanTwoThingsOrNothingIsNotRead(String typed) {
        assertThat(Texts.decimal(typed)).isEmpty();
    }
}
