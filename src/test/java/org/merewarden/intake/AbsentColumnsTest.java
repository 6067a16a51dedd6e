package org.merewarden.intake;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.junit.jupiter.api.Test;

class AbsentColumnsTest {
    @Test
    void aRowKnowsWhichColumnsItsFileDoesNotHave() {
        ImportedFile.Row row = new ImportedFile.Row(
                1,
                2,
                // the remark was typed when the row was mended; the cell of pieces is empty in the file
                Map.of("gadget_code", "a", "gadget_year", "2020", "weight_t", "1", "remark", "red"),
                null,
                false,
                Fate.refused());
        ImportedFile file = new ImportedFile(
                1,
                "test-gadgets.csv",
                "",
                "test-gadgets",
                "",
                "",
                DecimalMark.POINT,
                List.of("gadget_code", "gadget_year", "weight_t", "pieces"),
                null,
                false,
                List.of(row));
        List<Problem> problems = new ArrayList<>();
        TableRow typed = Examiner.typed(TestTables.GADGETS, file, row, problems);
        assertThat(problems).isEmpty();
        assertThat(typed.absent()).containsExactlyInAnyOrder("gadget_sector", "share", "seen_on");
    }

    @Test
    void whatIsStoredStandsInTheirPlaceAlsoWhereItIsUnknown() {
        TableRow row = new TableRow(
                2, Map.of("kind", "lake", "depth", 3.0, "note", "new"), java.util.Set.of("kind", "depth", "x"));
        Map<String, @Nullable Object> stored = new HashMap<>();
        stored.put("kind", "lagoon");
        stored.put("depth", null);
        stored.put("note", "old");
        assertThat(row.over(stored).values()).isEqualTo(Map.of("kind", "lagoon", "note", "new"));
    }
}
