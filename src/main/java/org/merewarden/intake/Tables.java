package org.merewarden.intake;

import java.util.Collection;
import java.util.Comparator;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.jspecify.annotations.Nullable;
import org.springframework.beans.factory.ObjectProvider;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.stereotype.Component;

/** The tables that the features understand, in the order in which they are stored. */
@Component
class Tables {
    private final List<TableHandler> handlers;
    private final Map<String, TableDefinition> definitions = new HashMap<>();

    @Autowired
    Tables(ObjectProvider<TableHandler> handlers) {
        this(handlers.stream().toList());
    }

    Tables(Collection<? extends TableHandler> handlers) {
        this.handlers = handlers.stream()
                .sorted(Comparator.comparingInt(
                                (TableHandler h) -> h.definition().order())
                        .thenComparing(h -> h.definition().name()))
                .map(h -> (TableHandler) h)
                .toList();
        for (TableHandler handler : this.handlers) {
            TableDefinition definition = handler.definition();
            if (definitions.put(definition.name(), definition) != null) {
                throw new IllegalStateException("two handlers for the table " + definition.name());
            }
        }
    }

    List<TableHandler> handlers() {
        return handlers;
    }

    List<TableDefinition> all() {
        return handlers.stream().map(TableHandler::definition).toList();
    }

    Optional<TableDefinition> find(@Nullable String name) {
        return Optional.ofNullable(name == null ? null : definitions.get(name));
    }

    /** By the sheet's or file's name, else by the header where exactly one table fits it best; null: unknown. */
    @Nullable
    String guess(String fileName, String sheet, List<String> header) {
        String bySheet = asTableName(sheet);
        String byFile = asTableName(fileName.replaceFirst("\\.[A-Za-z]{1,5}$", ""));
        if (definitions.containsKey(bySheet)) {
            return bySheet;
        }
        return definitions.containsKey(byFile) ? byFile : guessByHeader(Set.copyOf(header));
    }

    private static String asTableName(String name) {
        return TableBuilder.normalised(name).replace('_', '-').toLowerCase(Locale.ROOT);
    }

    private @Nullable String guessByHeader(Set<String> header) {
        String best = null;
        long most = 0;
        boolean tied = false;
        for (TableDefinition table : all()) {
            if (header.containsAll(table.requiredNames())) {
                long known =
                        table.columnNames().stream().filter(header::contains).count();
                tied = known == most || known < most && tied;
                if (known > most) {
                    best = table.name();
                    most = known;
                }
            }
        }
        return tied ? null : best;
    }
}
