package org.merewarden.intake;

import java.io.IOException;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Objects;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.core.io.Resource;
import org.springframework.core.io.support.PathMatchingResourcePatternResolver;

/** The CSV files of a folder (of the disk, or inside the packaged application) that are named like a known table. */
final class FolderFiles {
    private static final Logger LOG = LoggerFactory.getLogger(FolderFiles.class);

    private FolderFiles() {}

    /** @param location e.g. {@code classpath:db-seed/} or {@code file:/data/region/} */
    static List<Upload> read(Tables tables, String location) throws IOException {
        Resource[] found = new PathMatchingResourcePatternResolver()
                .getResources((location.endsWith("/") ? location : location + "/") + "*.csv");
        Arrays.sort(found, Comparator.comparing(FolderFiles::nameOf));
        List<Upload> files = new ArrayList<>();
        for (Resource file : found) {
            String name = nameOf(file);
            if (tables.find(name.substring(0, name.length() - ".csv".length())).isPresent()) {
                files.add(new Upload(name, file.getContentAsByteArray()));
            } else {
                LOG.info("{} of {} is passed over: no table of this name is known", name, location);
            }
        }
        return files;
    }

    private static String nameOf(Resource file) {
        return Objects.requireNonNullElse(file.getFilename(), ".csv");
    }
}
