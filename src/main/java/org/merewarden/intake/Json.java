package org.merewarden.intake;

import java.util.List;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import tools.jackson.core.type.TypeReference;
import tools.jackson.databind.json.JsonMapper;

/** Cells and problems as the store keeps them. */
final class Json {
    private static final JsonMapper MAPPER = JsonMapper.builder().build();

    private Json() {}

    static String write(Object value) {
        return MAPPER.writeValueAsString(value);
    }

    static Map<String, String> cells(String json) {
        return MAPPER.readValue(json, new TypeReference<>() {});
    }

    static List<String> texts(String json) {
        return MAPPER.readValue(json, new TypeReference<>() {});
    }

    static @Nullable Problem problem(@Nullable String json) {
        return json == null ? null : MAPPER.readValue(json, Problem.class);
    }

    static List<Problem> problems(@Nullable String json) {
        return json == null ? List.of() : MAPPER.readValue(json, new TypeReference<>() {});
    }
}
