package org.merewarden.jobs;

/** What a handler knows of the job it does. */
public interface RunningJob {
    long id();

    /** What the submitter handed over. */
    String payload();

    String requestedBy();

    /** Whether somebody asked to stop; handlers look between two pieces of work. */
    boolean cancelRequested();

    /** Stores the progress, so that the page can show it. */
    void progress(int done, int total, String note);
}
