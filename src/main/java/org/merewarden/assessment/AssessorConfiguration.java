package org.merewarden.assessment;

import org.merewarden.core.inference.Assessor;
import org.merewarden.core.inference.statespace.StateSpaceAssessor;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;

/** The method in use. */
@Configuration
class AssessorConfiguration {
    @Bean
    Assessor assessor() {
        return new StateSpaceAssessor();
    }
}
