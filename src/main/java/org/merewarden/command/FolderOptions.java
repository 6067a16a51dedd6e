package org.merewarden.command;

import java.nio.file.InvalidPathException;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Set;

/**
 * What {@code assess} or {@code advise} was asked for.
 *
 * @param folder of the tables
 * @param out file to write
 * @param threads stocks assessed at the same time, 1–{@value #MOST_THREADS}
 * @param seed combined with the seed that each stock's evidence names; 0 leaves that alone
 */
record FolderOptions(Path folder, Path out, int threads, long seed, Growth growth) {
    static final int MOST_THREADS = 1024;
    private static final String OUT = "--out";
    private static final String THREADS = "--threads";
    private static final String SEED = "--seed";
    private static final String GROWTH = "--growth";
    private static final Set<String> KNOWN = Set.of(OUT, THREADS, SEED, GROWTH);

    static FolderOptions of(List<String> words) throws UsageProblem {
        List<String> folders = new ArrayList<>();
        Map<String, String> options = new HashMap<>();
        for (int i = 0; i < words.size(); i++) {
            String word = words.get(i);
            if (!word.startsWith("--")) {
                folders.add(word);
                continue;
            }
            i++;
            put(options, word, i < words.size() ? words.get(i) : "--");
        }
        if (folders.size() != 1) {
            throw new UsageProblem(
                    folders.isEmpty()
                            ? "FOLDER is missing: the folder that holds stocks.csv"
                            : "one FOLDER is needed, got “" + String.join("”, “", folders) + "”");
        }
        String out = options.get(OUT);
        if (out == null) {
            throw new UsageProblem("--out FILE.csv is missing: the file to write");
        }
        return new FolderOptions(
                path("FOLDER", folders.get(0)),
                path(OUT, out),
                threads(options.getOrDefault(
                        THREADS, Integer.toString(Runtime.getRuntime().availableProcessors()))),
                seed(options.getOrDefault(SEED, "0")),
                Growth.named(options.getOrDefault(GROWTH, Growth.LOGISTIC.word())));
    }

    private static void put(Map<String, String> options, String option, String value) throws UsageProblem {
        if (!KNOWN.contains(option)) {
            throw new UsageProblem("the option “" + option + "” is unknown");
        }
        if (value.startsWith("--")) {
            throw new UsageProblem(option + " needs a value behind it");
        }
        if (options.put(option, value) != null) {
            throw new UsageProblem(option + " is given twice");
        }
    }

    private static Path path(String what, String text) throws UsageProblem {
        try {
            return Path.of(text);
        } catch (InvalidPathException e) {
            throw new UsageProblem(what + " “" + text + "” is no path: " + e.getReason());
        }
    }

    private static int threads(String text) throws UsageProblem {
        try {
            int threads = Integer.parseInt(text);
            if (threads >= 1 && threads <= MOST_THREADS) {
                return threads;
            }
        } catch (NumberFormatException e) {
            // told below, like a number out of range
        }
        throw new UsageProblem("--threads must be a whole number from 1 to " + MOST_THREADS + ", got “" + text + "”");
    }

    private static long seed(String text) throws UsageProblem {
        try {
            return Long.parseLong(text);
        } catch (NumberFormatException e) {
            throw new UsageProblem("--seed must be a whole number of at most 64 bits, got “" + text + "”");
        }
    }
}
