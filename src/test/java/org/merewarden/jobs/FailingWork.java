package org.merewarden.jobs;

import org.springframework.stereotype.Component;

/** Work for tests: fails where its payload says so. */
@Component
class FailingWork implements JobHandler {
    @Override
    public String kind() {
        return "test-work";
    }

    @Override
    public void run(RunningJob job) {
        job.progress(1, 2, "half");
        if (job.payload().equals("fail")) {
            throw new IllegalStateException("on purpose");
        }
        job.progress(2, 2, "whole");
    }
}
