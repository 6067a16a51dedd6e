package org.merewarden.intake;

import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.boot.ApplicationArguments;
import org.springframework.boot.ApplicationRunner;
import org.springframework.context.ApplicationEventPublisher;
import org.springframework.context.annotation.Profile;
import org.springframework.stereotype.Component;

/** Loads the demonstration region into a store that no import ever reached. A refusal stops the start, and says why. */
@Component
@Profile("demo")
class DemonstrationLoader implements ApplicationRunner {
    private static final Logger LOG = LoggerFactory.getLogger(DemonstrationLoader.class);
    private static final String REGION = "classpath:db-seed/";

    private final FolderImport folders;
    private final ImportStore store;
    private final ApplicationEventPublisher events;

    DemonstrationLoader(FolderImport folders, ImportStore store, ApplicationEventPublisher events) {
        this.folders = folders;
        this.store = store;
        this.events = events;
    }

    @Override
    public void run(ApplicationArguments arguments) {
        if (store.isEmpty()) {
            long id = folders.load(REGION, "the invented demonstration region");
            LOG.info("loaded the demonstration region as import {}", id);
            events.publishEvent(new DemonstrationLoaded());
        }
    }
}
