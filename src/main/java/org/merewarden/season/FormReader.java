package org.merewarden.season;

import java.time.LocalDate;
import java.time.format.DateTimeParseException;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Set;
import java.util.UUID;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Problem;
import org.springframework.validation.Errors;

/** Turns a typed slip into entries; what cannot be read becomes an error at its field that names the value. */
final class FormReader {
    private static final Set<String> FATES = Set.of("kept", "discarded", "released", "seized");
    static final List<String> SECTORS =
            List.of("commercial", "subsistence", "angling", "other party", "unlawful", "research", "discards");

    /** A code of three letters, a point and the name of a population. */
    private static final int LONGEST_SPECIES_KEY = 44;

    private final LandingForm form;
    private final Errors errors;
    /** for each entry, the index of its line in the form */
    private final List<Integer> lineOfEntry = new ArrayList<>();

    FormReader(LandingForm form, Errors errors) {
        this.form = form;
        this.errors = errors;
    }

    /** The entries of all lines with something in them; meaningless once there are errors. */
    List<Entry> entries() {
        readKey();
        LocalDate date = readDate();
        Head head = new Head(
                date,
                required("lake", form.getLake(), 60),
                text("cooperative", form.getCooperative(), 60),
                choice("sector", form.getSector()),
                text("gear", form.getGear(), 60),
                decimal("nets", form.getNets(), EntryRules.MAX_EFFORT),
                decimal("nights", form.getNights(), EntryRules.MAX_EFFORT),
                text("slip", form.getSlip(), 60),
                text("place", form.getPlace(), 200),
                text("note", form.getNote(), 2000));
        List<Entry> entries = new ArrayList<>();
        for (int i = 0; i < form.getLines().size(); i++) {
            if (!form.getLines().get(i).blank()) {
                lineOfEntry.add(i);
                entries.add(entry(head, i, entries.size() + 1));
            }
        }
        if (entries.isEmpty()) {
            reject("lines[0].weight", "Enter at least one line: a species and its weight.");
        }
        if (entries.size() > LandingLog.MAX_LINES) {
            errors.reject("season.lines", "At most " + LandingLog.MAX_LINES + " lines fit on one form.");
        }
        return entries;
    }

    private record Head(
            LocalDate date,
            String lake,
            @Nullable String cooperative,
            String sector,
            @Nullable String gear,
            @Nullable Double nets,
            @Nullable Double nights,
            @Nullable String slip,
            @Nullable String place,
            @Nullable String note) {}

    private Entry entry(Head head, int index, int number) {
        LandingForm.Line line = form.getLines().get(index);
        String at = "lines[" + index + "].";
        String chosen = line.getOtherSpecies().isEmpty() ? line.getSpecies() : line.getOtherSpecies();
        if (chosen.isEmpty()) {
            reject(at + "species", "Choose a species, or mixed.");
        }
        if (chosen.length() > LONGEST_SPECIES_KEY) {
            reject(
                    at + (line.getOtherSpecies().isEmpty() ? "species" : "otherSpecies"),
                    "At most " + LONGEST_SPECIES_KEY + " characters; this has " + chosen.length() + ".");
        }
        int dot = chosen.indexOf('.');
        String species = dot < 0 ? chosen : chosen.substring(0, dot);
        boolean mixed = species.equalsIgnoreCase(Entry.MIXED);
        Double weight = decimal(at + "weight", line.getWeight(), EntryRules.MAX_WEIGHT_KG);
        if (line.getWeight().isEmpty()) {
            reject(at + "weight", "Enter the weight in kg; 0 where the fish were counted but not weighed.");
        }
        if (!FATES.contains(line.getFate())) {
            reject(at + "fate", "“" + line.getFate() + "” is none of kept, discarded, released, seized.");
        }
        return new Entry(
                LandingLog.lineKey(form.getKey(), number),
                head.date,
                head.slip,
                head.lake,
                mixed ? Entry.MIXED : species.toUpperCase(Locale.ROOT),
                dot < 0 ? "" : chosen.substring(dot + 1),
                head.cooperative,
                head.sector,
                head.gear,
                head.nets,
                head.nights,
                weight == null ? 0 : weight,
                line.getPresentation().isEmpty() ? "whole" : line.getPresentation(),
                count(at + "number", line.getNumber()),
                line.getFate(),
                head.place,
                head.note);
    }

    private void readKey() {
        try {
            form.setKey(UUID.fromString(form.getKey()).toString());
        } catch (IllegalArgumentException e) {
            form.setKey(UUID.randomUUID().toString());
            errors.reject("season.key", "The form lost its own number; it has a new one now. Please send it again.");
        }
    }

    private LocalDate readDate() {
        try {
            return LocalDate.parse(form.getDate());
        } catch (DateTimeParseException e) {
            reject("date", "“" + form.getDate() + "” is no date; write it as year-month-day, e.g. 2026-06-01.");
            return LocalDate.EPOCH;
        }
    }

    private String required(String field, String value, int length) {
        String text = text(field, value, length);
        if (text == null) {
            reject(field, "Please choose one.");
        }
        return Texts.orEmpty(text);
    }

    private @Nullable String text(String field, String value, int length) {
        if (value.length() > length) {
            reject(field, "At most " + length + " characters; this has " + value.length() + ".");
        }
        return Texts.orNull(value);
    }

    private String choice(String field, String value) {
        if (!SECTORS.contains(value)) {
            reject(field, "“" + value + "” is none of " + String.join(", ", SECTORS) + ".");
        }
        return value;
    }

    private @Nullable Double decimal(String field, String value, double most) {
        if (value.isEmpty()) {
            return null;
        }
        Double read = Texts.decimal(value).orElse(null);
        if (read == null || read > most) {
            reject(
                    field,
                    "“" + value + "” is not understood: a number from 0 to " + Texts.plain(most)
                            + ", without separators between thousands, e.g. 12.5.");
        }
        return read;
    }

    private @Nullable Integer count(String field, String value) {
        if (value.isEmpty()) {
            return null;
        }
        if (!value.matches("\\d{1,8}")) {
            reject(field, "“" + value + "” is not understood: a whole number of fish.");
            return null;
        }
        return Integer.valueOf(value);
    }

    /** Sets what the rules found at the fields it came from. */
    void show(List<List<Problem>> problems) {
        for (int entry = 0; entry < problems.size(); entry++) {
            for (Problem problem : problems.get(entry)) {
                reject(
                        field(problem.column(), lineOfEntry.get(entry)),
                        "“" + problem.value() + "” " + problem.rule() + ".");
            }
        }
    }

    private String field(String column, int line) {
        return switch (column) {
            case "water_body" -> "lake";
            case "weight_kg" -> "lines[" + line + "].weight";
            case "species", "presentation" -> "lines[" + line + "]." + column;
            default -> column;
        };
    }

    /** What concerns the whole slip would come once for each line. */
    private void reject(String field, String message) {
        boolean said = errors.getFieldErrors(field).stream().anyMatch(e -> message.equals(e.getDefaultMessage()));
        if (!said) {
            errors.rejectValue(field, "season.form", message);
        }
    }
}
