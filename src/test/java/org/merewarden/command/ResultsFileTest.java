package org.merewarden.command;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.IOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Locale;
import java.util.stream.Stream;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.merewarden.core.inference.Verdict;

class ResultsFileTest {
    @TempDir
    Path folder;

    private static StockResult result() {
        return new StockResult(
                "mere",
                "FPE.deep",
                List.of(
                        new Line("msy_t", null, new double[] {12.5, 1, 2, 3, 4, 5, 6, 7, 8}),
                        Line.single("collapse_course", 2025, 0.25),
                        Line.unknown("observation_sd:nets, north", null)),
                987.5,
                new Verdict(false, List.of("why")));
    }

    private static void write(Path out) throws IOException {
        new OutputFile(out, ResultsFile.HEADER).write(ResultsFile.rows(result()).toList());
    }

    @Test
    void isWrittenAsDescribedAndReplacesWhatIsThere() throws IOException {
        Path out = folder.resolve("r.csv");
        Files.writeString(out, "older");
        Locale before = Locale.getDefault();
        Locale.setDefault(Locale.GERMANY);
        try {
            write(out);
        } finally {
            Locale.setDefault(before);
        }
        assertThat(Files.readString(out)).isEqualTo("""
                water_body,species,quantity,year,mean,sd,q05,q10,q25,q50,q75,q90,q95,ess,verdict\r
                mere,FPE.deep,msy_t,,12.5,1,2,3,4,5,6,7,8,987.5,not-settled\r
                mere,FPE.deep,collapse_course,2025,0.25,,,,,,,,,987.5,not-settled\r
                mere,FPE.deep,"observation_sd:nets, north",,,,,,,,,,,987.5,not-settled\r
                """);
        try (Stream<Path> left = Files.list(folder)) {
            assertThat(left).containsExactly(out);
        }
    }

    @ParameterizedTest
    @CsvSource(
            nullValues = "null",
            value = {
                "null, ''",
                "NaN, ''",
                "Infinity, ''",
                "0, 0",
                "-0.0, 0",
                "100, 100",
                "0.1, 0.1",
                "-0.0123456789123, -0.0123456789",
                "123456789.5, 123456790",
                "2e14, 200000000000000",
                "1e20, 1E+20",
                "1.5e-9, 1.5E-9"
            })
    void numbersHaveNineDigitsAndAPoint(Double value, String text) {
        assertThat(ResultsFile.number(value)).isEqualTo(text);
    }

    @Test
    void aPlaceThatCannotBeWrittenIsRefusedBeforehand() {
        assertThatThrownBy(() -> new OutputFile(folder, ResultsFile.HEADER).check(folder))
                .isInstanceOf(UsageProblem.class)
                .hasMessageContaining("is a folder");
        assertThatThrownBy(() -> new OutputFile(folder.resolve("none/r.csv"), ResultsFile.HEADER).check(folder))
                .isInstanceOf(UsageProblem.class)
                .hasMessageContaining("none is no folder to write in");
    }

    @Test
    void aTableOfTheFolderIsNotReplacedButOlderResultsAre() throws Exception {
        Path table = Files.writeString(folder.resolve("catches.csv"), "water_body,species,year,catch_t\n");
        assertThatThrownBy(() -> new OutputFile(table, ResultsFile.HEADER).check(folder))
                .isInstanceOf(UsageProblem.class)
                .hasMessageContaining("catches.csv is a file of FOLDER that holds no results");
        Path older = folder.resolve("r.csv");
        write(older);
        new OutputFile(older, ResultsFile.HEADER).check(folder);
    }
}
