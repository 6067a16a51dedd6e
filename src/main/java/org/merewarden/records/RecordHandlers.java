package org.merewarden.records;

import org.merewarden.waterbody.Register;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/** One handler for each table of evidence. */
@Configuration
class RecordHandlers {
    private final RecordStore store;
    private final Register register;

    RecordHandlers(RecordStore store, Register register) {
        this.store = store;
        this.register = register;
    }

    @Bean
    RecordHandler catchHandler() {
        return new RecordHandler(RecordTables.CATCHES, store, register);
    }

    @Bean
    RecordHandler effortHandler() {
        return new RecordHandler(RecordTables.EFFORT, store, register);
    }

    @Bean
    RecordHandler surveyHandler() {
        return new RecordHandler(RecordTables.SURVEYS, store, register);
    }

    @Bean
    RecordHandler eventHandler() {
        return new RecordHandler(RecordTables.EVENTS, store, register);
    }

    @Bean
    RecordHandler areaHandler() {
        return new RecordHandler(RecordTables.AREAS, store, register);
    }

    @Bean
    RecordHandler priorHandler() {
        return new RecordHandler(RecordTables.PRIORS, store, register);
    }
}
