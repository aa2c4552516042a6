package org.stillpath;

import static com.tngtech.archunit.base.DescribedPredicate.describe;
import static com.tngtech.archunit.core.domain.JavaModifier.FINAL;
import static com.tngtech.archunit.core.domain.JavaModifier.STATIC;
import static com.tngtech.archunit.core.domain.JavaModifier.SYNTHETIC;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.classes;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.fields;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static com.tngtech.archunit.library.dependencies.SlicesRuleDefinition.slices;
import static org.assertj.core.api.Assertions.assertThat;

import com.tngtech.archunit.core.domain.Dependency;
import com.tngtech.archunit.core.domain.JavaClass;
import com.tngtech.archunit.core.domain.JavaField;
import com.tngtech.archunit.core.importer.ImportOption;
import com.tngtech.archunit.junit.AnalyzeClasses;
import com.tngtech.archunit.junit.ArchTest;
import com.tngtech.archunit.lang.ArchCondition;
import com.tngtech.archunit.lang.ArchRule;
import com.tngtech.archunit.lang.ConditionEvents;
import com.tngtech.archunit.lang.SimpleConditionEvent;
import java.util.Map;
import java.util.Set;
import org.junit.jupiter.api.Test;

/** Holds the floors that DEVELOPERS.md draws: a package uses lower floors only. */
@AnalyzeClasses(packages = "org.stillpath", importOptions = ImportOption.DoNotIncludeTests.class)
class ArchitectureTest {
    /** Floor of each top package. A new package must be given a floor here. */
    private static final Map<String, Integer> FLOORS = Map.ofEntries(
            Map.entry("problem", 0),
            Map.entry("unit", 1),
            Map.entry("formula", 2),
            Map.entry("geometry", 2),
            Map.entry("job", 2),
            Map.entry("medium", 3),
            Map.entry("ray", 4),
            Map.entry("path", 5),
            Map.entry("wave", 5),
            Map.entry("task", 6),
            Map.entry("study", 7),
            Map.entry("io", 8),
            Map.entry("plot", 8),
            Map.entry("report", 9),
            Map.entry("cli", 10));

    @ArchTest
    static final ArchRule PACKAGES_USE_LOWER_FLOORS_ONLY = classes().should(useLowerFloorsOnly());

    @ArchTest
    static final ArchRule NO_CYCLES =
            slices().matching("org.stillpath.(*)..").should().beFreeOfCycles();

    @ArchTest
    static final ArchRule ONLY_CLI_PRINTS_OR_EXITS = noClasses()
            .that()
            .resideOutsideOfPackage("org.stillpath.cli..")
            .should()
            .accessField(System.class, "out")
            .orShould()
            .accessField(System.class, "err")
            .orShould()
            .accessField(System.class, "in")
            .orShould()
            .callMethod(System.class, "exit", int.class)
            .orShould()
            .callMethod(Throwable.class, "printStackTrace");

    @ArchTest
    static final ArchRule THE_ENGINE_KNOWS_NO_PICTURES_FILES_OR_COMMANDS = noClasses()
            .that(describe("lie below floor 8", c -> floor(c) < 8))
            .should()
            .dependOnClassesThat()
            .resideInAnyPackage(
                    "java.awt..",
                    "javax.swing..",
                    "javax.imageio..",
                    "java.nio.file..",
                    "org.snakeyaml..",
                    "com.fasterxml..",
                    "org.jfree..",
                    "com.samskivert..",
                    "picocli..");

    @ArchTest
    static final ArchRule ONLY_PLOT_DRAWS = noClasses()
            .that()
            .resideOutsideOfPackage("org.stillpath.plot..")
            .should()
            .dependOnClassesThat()
            .resideInAnyPackage("java.awt..", "javax.imageio..", "org.jfree..");

    @ArchTest
    static final ArchRule NO_STATIC_STATE = fields().that(describe(
                    "are static and written by hand",
                    (JavaField f) -> f.getModifiers().contains(STATIC)
                            && !f.getModifiers().contains(SYNTHETIC)))
            .should(new ArchCondition<JavaField>("be final and no collection under construction") {
                @Override
                public void check(JavaField field, ConditionEvents events) {
                    boolean constant = field.getModifiers().contains(FINAL)
                            && !MUTABLE.contains(field.getRawType().getName());
                    if (!constant) {
                        events.add(SimpleConditionEvent.violated(field, field.getFullName() + " is static state"));
                    }
                }
            });

    private static final Set<String> MUTABLE = Set.of(
            "java.util.ArrayList",
            "java.util.HashMap",
            "java.util.LinkedHashMap",
            "java.util.concurrent.ConcurrentHashMap",
            "java.util.concurrent.atomic.AtomicInteger",
            "java.util.concurrent.atomic.AtomicLong",
            "java.util.concurrent.atomic.AtomicReference",
            "java.lang.StringBuilder",
            "java.lang.ThreadLocal");

    @Test
    void floorsAreReadFromTheTopPackage() {
        assertThat(floor("org.stillpath.task.survey")).isEqualTo(6);
        assertThat(floor("org.stillpath.problem")).isZero();
    }

    private static int floor(JavaClass c) {
        return floor(c.getPackageName());
    }

    private static int floor(String packageName) {
        String top = packageName.substring("org.stillpath.".length()).split("\\.", 2)[0];
        Integer floor = FLOORS.get(top);
        if (floor == null) {
            throw new AssertionError("package " + packageName + " has no floor yet");
        }
        return floor;
    }

    private static String top(JavaClass c) {
        return c.getPackageName().substring("org.stillpath.".length()).split("\\.", 2)[0];
    }

    private static ArchCondition<JavaClass> useLowerFloorsOnly() {
        return new ArchCondition<>("use lower floors only") {
            @Override
            public void check(JavaClass c, ConditionEvents events) {
                for (Dependency d : c.getDirectDependenciesFromSelf()) {
                    JavaClass target = d.getTargetClass().getBaseComponentType();
                    boolean inside = target.getPackageName().startsWith("org.stillpath.");
                    if (inside && !top(target).equals(top(c)) && floor(target) >= floor(c)) {
                        events.add(SimpleConditionEvent.violated(c, d.getDescription()));
                    }
                }
            }
        };
    }
}
