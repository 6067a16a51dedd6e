package org.merewarden.intake;

import java.util.ArrayList;
import java.util.List;

/** Files that cannot be taken; every message names the file, line, column, value and rule. Nothing was stored. */
public class RefusedImport extends RuntimeException {
    private static final long serialVersionUID = 1L;

    private final ArrayList<String> messages;

    public RefusedImport(List<String> messages) {
        super(String.join("\n", messages));
        this.messages = new ArrayList<>(messages);
    }

    public List<String> messages() {
        return List.copyOf(messages);
    }

    static RefusedImport of(List<ImportedFile> files) {
        List<String> messages = new ArrayList<>();
        for (ImportedFile file : files) {
            if (file.problem() != null) {
                messages.add(file.problem());
            }
            for (ImportedFile.Row row : file.rows()) {
                row.fate().problems().forEach(p -> messages.add(p.at(file.name(), row.line())));
            }
        }
        return new RefusedImport(messages);
    }
}
