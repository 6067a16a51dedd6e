package org.merewarden.command;

/** The command line cannot be followed; the message names what is wrong. */
final class UsageProblem extends Exception {
    private static final long serialVersionUID = 1L;

    UsageProblem(String message) {
        super(message);
    }
}
