package org.merewarden.activity;

import java.time.LocalDate;
import java.time.ZoneId;
import java.time.ZoneOffset;
import java.util.LinkedHashMap;
import java.util.Locale;
import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.springframework.format.annotation.DateTimeFormat;
import org.springframework.web.util.UriComponentsBuilder;

/**
 * Which entries are asked for, as it stands in the address.
 *
 * @param person user name, empty for everybody
 * @param text what must occur in act, subject, before or after, in any case; empty for anything
 * @param from first day in the office's time zone, or null
 * @param to last day, or null
 * @param page from 1
 */
record ActivityFilter(
        @Nullable String person,
        @Nullable String text,

        @DateTimeFormat(iso = DateTimeFormat.ISO.DATE) @Nullable
        LocalDate from,

        @DateTimeFormat(iso = DateTimeFormat.ISO.DATE) @Nullable
        LocalDate to,

        @Nullable Integer page) {
    static final int PAGE_SIZE = 50;

    /** Days beyond the years of four digits are slips of the pen, and no store can compare with them. */
    boolean daysWithinReason() {
        return withinReason(from) && withinReason(to);
    }

    private static boolean withinReason(@Nullable LocalDate day) {
        return day == null || (day.getYear() >= 1 && day.getYear() <= 9999);
    }

    int pageNumber() {
        return page == null ? 1 : Math.max(1, Math.min(page, 1_000_000));
    }

    int offset() {
        return (pageNumber() - 1) * PAGE_SIZE;
    }

    /** The conditions that apply, in SQL over activity_entry with the parameters of {@link #parameters}. */
    String where() {
        return "where 1 = 1"
                + (given(person) ? " and actor = :person" : "")
                + (given(text)
                        ? " and lower(action || ' ' || subject || ' ' || coalesce(before_text, '') || ' '"
                                + " || coalesce(after_text, '')) like :text escape '!'"
                        : "")
                + (from != null ? " and happened_at >= :from" : "")
                + (to != null ? " and happened_at < :to" : "");
    }

    Map<String, Object> parameters(ZoneId zone) {
        Map<String, Object> parameters = new LinkedHashMap<>();
        if (person != null && given(person)) {
            parameters.put("person", person);
        }
        if (text != null && given(text)) {
            String quoted = text.strip().toLowerCase(Locale.ROOT).replaceAll("([!%_])", "!$1");
            parameters.put("text", "%" + quoted + "%");
        }
        if (from != null) {
            parameters.put("from", from.atStartOfDay(zone).toInstant().atOffset(ZoneOffset.UTC));
        }
        if (to != null) {
            parameters.put("to", to.plusDays(1).atStartOfDay(zone).toInstant().atOffset(ZoneOffset.UTC));
        }
        return parameters;
    }

    /** The address of another page of the same list. */
    String address(int otherPage) {
        UriComponentsBuilder address = UriComponentsBuilder.fromPath("/activity");
        add(address, "person", person);
        add(address, "text", text);
        add(address, "from", from);
        add(address, "to", to);
        return address.queryParam("page", otherPage).encode().build().toUriString();
    }

    private static void add(UriComponentsBuilder address, String name, @Nullable Object value) {
        if (value != null && !value.toString().isBlank()) {
            address.queryParam(name, "{" + name + "}").uriVariables(Map.of(name, value.toString()));
        }
    }

    private static boolean given(@Nullable String value) {
        return value != null && !value.isBlank();
    }
}
