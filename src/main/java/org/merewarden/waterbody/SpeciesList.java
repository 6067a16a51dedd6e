package org.merewarden.waterbody;

import java.io.IOException;
import java.io.InputStream;
import java.io.InputStreamReader;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import java.util.function.Function;
import java.util.stream.Collectors;
import org.apache.commons.csv.CSVFormat;
import org.apache.commons.csv.CSVParser;
import org.springframework.stereotype.Component;

/**
 * The species an office may register, from {@code species.csv}: three-letter codes and scientific names of the ASFIS
 * list published by FAO (an extract of 2020; some scientific names have changed since, codes have not), English names
 * added from general knowledge.
 */
@Component
class SpeciesList {
    private final List<Species> byName;
    private final Map<String, Species> byCode;

    SpeciesList() {
        byName = read();
        byCode = byName.stream().collect(Collectors.toMap(Species::code, Function.identity()));
    }

    private static List<Species> read() {
        CSVFormat format = CSVFormat.RFC4180
                .builder()
                .setHeader()
                .setSkipHeaderRecord(true)
                .get();
        try (InputStream in = Objects.requireNonNull(
                        SpeciesList.class.getResourceAsStream("/species.csv"), "species.csv is part of the program");
                CSVParser rows = format.parse(new InputStreamReader(in, StandardCharsets.UTF_8))) {
            return rows.stream()
                    .map(r -> new Species(r.get("alpha3"), r.get("scientific_name"), r.get("english_name")))
                    .sorted(Comparator.comparing(Species::englishName, String.CASE_INSENSITIVE_ORDER))
                    .toList();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    List<Species> all() {
        return byName;
    }

    Optional<Species> find(String code) {
        return Optional.ofNullable(byCode.get(code));
    }

    /** The English name, or the code where the list does not know it. */
    String name(String code) {
        return find(code).map(Species::englishName).orElse(code);
    }
}
