package org.merewarden.web;

import tools.jackson.databind.json.JsonMapper;

/** Data for a chart, safe to stand inside a script element of the page. Give null, not NaN, for what is missing. */
public final class PageJson {
    private static final JsonMapper MAPPER = JsonMapper.builder().build();

    private PageJson() {}

    /** The value as JSON in which no character can end the element or start a tag, comment or entity. */
    public static String of(Object value) {
        // outside strings JSON has none of these characters, so replacing them everywhere is sound
        return MAPPER.writeValueAsString(value)
                .replace("<", "\\u003c")
                .replace(">", "\\u003e")
                .replace("&", "\\u0026")
                .replace("\u2028", "\\u2028")
                .replace("\u2029", "\\u2029");
    }
}
