package org.merewarden.command;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.nio.file.Path;
import java.util.List;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

class FolderOptionsTest {
    @Test
    void everyOptionIsRead() throws Exception {
        FolderOptions options = FolderOptions.of(
                List.of("--seed", "-7", "lakes", "--out", "r.csv", "--threads", "3", "--growth", "fitted"));
        assertThat(options).isEqualTo(new FolderOptions(Path.of("lakes"), Path.of("r.csv"), 3, -7, Growth.FITTED));
    }

    @Test
    void whatIsLeftOutHasADefault() throws Exception {
        assertThat(FolderOptions.of(List.of("lakes", "--out", "r.csv")))
                .isEqualTo(new FolderOptions(
                        Path.of("lakes"),
                        Path.of("r.csv"),
                        Runtime.getRuntime().availableProcessors(),
                        0,
                        Growth.LOGISTIC));
    }

    @ParameterizedTest
    @CsvSource(delimiter = '|', textBlock = """
        --out r.csv                           | FOLDER is missing
        lakes                                 | --out FILE.csv is missing
        lakes --out                           | --out needs a value
        lakes --out --seed 1                  | --out needs a value
        lakes other --out r.csv               | one FOLDER is needed, got “lakes”, “other”
        lakes --out r.csv --out s.csv         | --out is given twice
        lakes --out r.csv --colour red        | the option “--colour” is unknown
        lakes --out r.csv --threads 0         | --threads must be a whole number from 1 to 1024, got “0”
        lakes --out r.csv --threads two       | --threads must be a whole number from 1 to 1024, got “two”
        lakes --out r.csv --threads 1025      | got “1025”
        lakes --out r.csv --seed 1.5          | --seed must be a whole number of at most 64 bits, got “1.5”
        lakes --out r.csv --growth schaefer   | --growth must be one of logistic, gompertz, fitted, got “schaefer”
        """)
    void whatCannotBeFollowedIsNamed(String words, String message) {
        assertThatThrownBy(() -> FolderOptions.of(List.of(words.split(" "))))
                .isInstanceOf(UsageProblem.class)
                .hasMessageContaining(message);
    }
}
