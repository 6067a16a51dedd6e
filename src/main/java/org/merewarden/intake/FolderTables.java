package org.merewarden.intake;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Collection;
import java.util.Collections;
import java.util.List;
import java.util.Map;

/** Reads the tables of a folder without any store: for the command line. */
public final class FolderTables {
    private FolderTables() {}

    /**
     * @return the rows by table; a table without a file, or with an empty one, is absent
     * @throws RefusedImport with every reason; references between tables are the caller's to check
     */
    public static Map<String, List<TableRow>> read(Path folder, Collection<TableDefinition> definitions) {
        Tables tables = new Tables(definitions.stream().map(Storeless::new).toList());
        List<ImportedFile> files = new ArrayList<>();
        try {
            for (Upload file : FolderFiles.read(tables, folder.toUri().toString())) {
                files.addAll(ImportReader.read(tables, file));
            }
        } catch (IOException e) {
            throw new UncheckedIOException("cannot read " + folder, e);
        }
        Examiner.Outcome outcome = new Examiner(tables).examine(files);
        if (outcome.refused()) {
            throw RefusedImport.of(outcome.files());
        }
        return outcome.toStore();
    }

    /** Every row is new where nothing is stored. */
    private record Storeless(TableDefinition definition) implements TableHandler {
        @Override
        public List<Fate> examine(List<TableRow> rows, Batch batch) {
            return Collections.nCopies(rows.size(), Fate.NEW);
        }

        @Override
        public void store(List<TableRow> rows, Provenance provenance) {
            throw new UnsupportedOperationException("nothing is stored from the command line");
        }
    }
}
