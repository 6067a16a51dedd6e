package org.merewarden.jobs;

/** The work of one kind of job. A shallow shell around a service; killed half-way it is started again. */
public interface JobHandler {
    /** Name of the kind, at most 40 characters. */
    String kind();

    /** Does the work; an exception marks the job as failed. Runs outside any transaction. */
    void run(RunningJob job);
}
