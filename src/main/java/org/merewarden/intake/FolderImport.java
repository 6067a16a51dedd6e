package org.merewarden.intake;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.List;
import org.springframework.stereotype.Service;

/** Stores the tables of a folder, through the same examination as an upload. */
@Service
public class FolderImport {
    private final Tables tables;
    private final Importer importer;
    private final ImportStore store;

    FolderImport(Tables tables, Importer importer, ImportStore store) {
        this.tables = tables;
        this.importer = importer;
        this.store = store;
    }

    /**
     * Reads every CSV file that is named like a known table and stores all of them in one transaction.
     *
     * @param location e.g. {@code classpath:db-seed/} or {@code file:/data/region/}
     * @param note what the import's record says about it
     * @return the import's number
     * @throws RefusedImport with every reason, when a file or row is refused or no table was found; the import's record
     *     is then kept as discarded
     */
    public long load(String location, String note) {
        List<Upload> files;
        try {
            files = FolderFiles.read(tables, location);
        } catch (IOException e) {
            throw new UncheckedIOException("cannot read " + location, e);
        }
        if (files.isEmpty()) {
            throw new RefusedImport(List.of(location + ": no file is named like a known table"));
        }
        long id = importer.upload(files, note);
        Importer.Result result = importer.commit(id, store.version(id));
        if (result != Importer.Result.COMMITTED) {
            List<ImportedFile> examined = store.files(id);
            importer.discard(id, store.version(id));
            throw RefusedImport.of(examined);
        }
        return id;
    }
}
