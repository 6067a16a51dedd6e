package org.merewarden.intake;

/** A whole file is refused: what is wrong, where, and what would be right. */
final class UnreadableFile extends Exception {
    private static final long serialVersionUID = 1L;

    private final int line;
    private final transient Problem problem;

    /** @param line line of the file or row of the sheet; 0 where the whole file is meant */
    UnreadableFile(int line, String column, String value, String rule) {
        super(rule);
        this.line = line;
        this.problem = new Problem(column, value, rule);
    }

    UnreadableFile(String rule) {
        this(0, "", "", rule);
    }

    int line() {
        return line;
    }

    Problem problem() {
        return problem;
    }
}
