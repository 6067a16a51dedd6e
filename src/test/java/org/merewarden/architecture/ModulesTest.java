package org.merewarden.architecture;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import com.tngtech.archunit.core.importer.ImportOption;
import org.junit.jupiter.api.Test;
import org.merewarden.Merewarden;
import org.merewarden.violations.Violations;
import org.springframework.modulith.core.ApplicationModules;

/** Features reach only each other's public types, without cycles; a deliberate violation shows that the check bites. */
class ModulesTest {
    @Test
    void featuresKeepToEachOthersPublicTypes() {
        var modules = ApplicationModules.of(Merewarden.class);
        assertThat(modules.stream().map(m -> m.getBasePackage().getName()))
                .contains(
                        "org.merewarden.core.dynamics",
                        "org.merewarden.records",
                        "org.merewarden.sharing",
                        "org.merewarden.command");
        modules.verify();
    }

    @Test
    void useOfAnInternalTypeFails() {
        ApplicationModules modules = ApplicationModules.of(Violations.class, new ImportOption.OnlyIncludeTests());
        assertThatThrownBy(modules::verify)
                .hasMessageContaining("org.merewarden.violations.left.Reaching")
                .hasMessageContaining("org.merewarden.violations.right.internal.Hidden");
    }
}
