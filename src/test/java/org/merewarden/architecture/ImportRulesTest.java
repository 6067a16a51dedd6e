package org.merewarden.architecture;

import static com.tngtech.archunit.base.DescribedPredicate.not;
import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideInAnyPackage;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.classes;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static org.assertj.core.api.Assertions.assertThat;

import com.tngtech.archunit.core.domain.JavaClasses;
import com.tngtech.archunit.core.importer.ClassFileImporter;
import com.tngtech.archunit.core.importer.ImportOption;
import com.tngtech.archunit.lang.ArchRule;
import jakarta.persistence.Entity;
import java.util.Map;
import java.util.stream.Stream;
import org.junit.jupiter.api.DynamicTest;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestFactory;
import org.springframework.data.repository.Repository;
import org.springframework.stereotype.Controller;

/** Which room may import which, as the architecture's table says. */
class ImportRulesTest {
    private static final String ROOT = "org.merewarden.";
    private static final String[] LANGUAGE = {"java..", "org.jspecify.annotations..", "org.apache.commons.math3.."};

    private static final String BASE = "web account activity jobs intake";
    private static final String CORE =
            "core.dynamics core.evidence core.prior core.inference core.policy core.outlook core.survey core.pooling";

    /** Room → the rooms that it may import beside itself. */
    private static final Map<String, String> MAY_IMPORT = Map.ofEntries(
            Map.entry("web", ""),
            Map.entry("activity", "web"),
            Map.entry("account", "web activity"),
            Map.entry("jobs", "web activity"),
            Map.entry("intake", "web account activity jobs"),
            Map.entry("waterbody", BASE),
            Map.entry("records", BASE + " waterbody core.evidence core.survey"),
            Map.entry("assessment", BASE + " waterbody records " + CORE),
            Map.entry("advice", BASE + " waterbody records assessment " + CORE),
            Map.entry("season", BASE + " waterbody records assessment advice " + CORE),
            Map.entry("portfolio", BASE + " waterbody records assessment advice season " + CORE),
            Map.entry("sharing", BASE + " waterbody records assessment advice season " + CORE),
            Map.entry("command", "intake records " + CORE),
            Map.entry("core.dynamics", ""),
            Map.entry("core.evidence", ""),
            Map.entry("core.prior", "core.dynamics core.evidence"),
            Map.entry("core.inference", "core.dynamics core.evidence core.prior"),
            Map.entry("core.outlook", "core.dynamics core.inference"),
            Map.entry("core.policy", "core.dynamics core.inference core.outlook"));

    private static final JavaClasses PRODUCTION = new ClassFileImporter()
            .withImportOption(new ImportOption.DoNotIncludeTests())
            .importPackages("org.merewarden");

    private static ArchRule coreIsPlainJava() {
        return classes()
                .that()
                .resideInAPackage(ROOT + "core..")
                .should()
                .onlyDependOnClassesThat(resideInAnyPackage(LANGUAGE).or(resideInAnyPackage(ROOT + "core..")));
    }

    @Test
    void theCoreImportsNothingButJavaMathematicsAndNullness() {
        coreIsPlainJava().check(PRODUCTION);
    }

    @Test
    void aCoreClassThatImportsAFrameworkFails() {
        JavaClasses withViolation = new ClassFileImporter().importPackages(ROOT + "core.dynamics");
        assertThat(coreIsPlainJava().evaluate(withViolation).getFailureReport().toString())
                .contains("DeliberateViolation")
                .contains("org.springframework.util.StringUtils");
    }

    @TestFactory
    Stream<DynamicTest> everyRoomImportsOnlyWhatTheTableAllows() {
        return MAY_IMPORT.entrySet().stream()
                .sorted(Map.Entry.comparingByKey())
                .map(entry -> DynamicTest.dynamicTest(
                        entry.getKey(),
                        () -> rule(entry.getKey(), entry.getValue()).check(PRODUCTION)));
    }

    private static ArchRule rule(String room, String allowed) {
        String[] packages = Stream.concat(
                        Stream.of(room), Stream.of(allowed.split(" ")).filter(name -> !name.isEmpty()))
                .map(name -> ROOT + name + "..")
                .toArray(String[]::new);
        return noClasses()
                .that()
                .resideInAPackage(ROOT + room + "..")
                .should()
                .dependOnClassesThat(resideInAnyPackage("org.merewarden..").and(not(resideInAnyPackage(packages))));
    }

    @Test
    void everyRoomIsInTheTable() {
        var rooms = PRODUCTION.stream()
                .map(c -> c.getPackageName().replace("org.merewarden", "").replaceFirst("^\\.", ""))
                .filter(name -> !name.isEmpty())
                .map(name -> name.replaceFirst("^(core\\.[^.]+|[^.]+).*", "$1"))
                .distinct();
        assertThat(rooms).isSubsetOf(MAY_IMPORT.keySet());
    }

    @Test
    void theInsideOfAFeatureIsNotPublic() {
        classes().that().areAnnotatedWith(Entity.class).should().notBePublic().check(PRODUCTION);
        classes()
                .that()
                .areAnnotatedWith(Controller.class)
                .should()
                .notBePublic()
                .check(PRODUCTION);
        classes()
                .that()
                .areAssignableTo(Repository.class)
                .should()
                .notBePublic()
                .check(PRODUCTION);
        classes().that().haveSimpleNameEndingWith("Form").should().notBePublic().check(PRODUCTION);
    }
}
