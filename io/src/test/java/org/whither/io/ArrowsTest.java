package org.whither.io;

import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static com.tngtech.archunit.library.dependencies.SlicesRuleDefinition.slices;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.tngtech.archunit.core.domain.JavaClasses;
import com.tngtech.archunit.core.importer.ClassFileImporter;
import com.tngtech.archunit.core.importer.ImportOption;
import com.tngtech.archunit.lang.ArchRule;
import com.tngtech.archunit.library.Architectures;
import org.junit.jupiter.api.Test;

/** The arrows between the rooms of the house run one way only. */
class ArrowsTest {
    private static final JavaClasses HOUSE = new ClassFileImporter()
            .withImportOption(ImportOption.Predefined.DO_NOT_INCLUDE_TESTS)
            .importPackages("org.whither");

    @Test
    void scan_house_findsAllModules() {
        assertTrue(HOUSE.size() > 100, "only " + HOUSE.size() + " classes were found");
        for (String room : new String[] {"film", "trace", "fate", "eddy", "render", "samples", "io"}) {
            assertTrue(
                    HOUSE.stream().anyMatch(found -> found.getPackageName().startsWith("org.whither." + room)), room);
        }
    }

    @Test
    void rooms_mayKnow_onlyWhatLiesBelow() {
        ArchRule arrows = Architectures.layeredArchitecture()
                .consideringOnlyDependenciesInAnyPackage("org.whither..")
                .layer("film")
                .definedBy("org.whither.film..")
                .layer("trace")
                .definedBy("org.whither.trace..")
                .layer("fate")
                .definedBy("org.whither.fate..")
                .layer("eddy")
                .definedBy("org.whither.eddy..")
                .layer("render")
                .definedBy("org.whither.render..")
                .layer("samples")
                .definedBy("org.whither.samples..")
                .layer("io")
                .definedBy("org.whither.io..")
                .whereLayer("film")
                .mayNotAccessAnyLayer()
                .whereLayer("trace")
                .mayOnlyAccessLayers("film")
                .whereLayer("fate")
                .mayOnlyAccessLayers("film", "trace")
                .whereLayer("eddy")
                .mayOnlyAccessLayers("film", "trace", "fate")
                .whereLayer("render")
                .mayOnlyAccessLayers("film", "trace", "fate", "eddy")
                .whereLayer("samples")
                .mayOnlyAccessLayers("film", "trace", "fate")
                .whereLayer("io")
                .mayOnlyAccessLayers("film", "trace", "fate", "eddy", "render", "samples");
        arrows.check(HOUSE);
    }

    @Test
    void rooms_haveNoCircles() {
        slices().matching("org.whither.(*)..").should().beFreeOfCycles().check(HOUSE);
        slices().matching("org.whither.io.(*)..").should().beFreeOfCycles().check(HOUSE);
    }

    @Test
    void libraries_stayInTheirRoom() {
        noClasses()
                .that()
                .resideOutsideOfPackage("org.whither.io.hdf5..")
                .should()
                .dependOnClassesThat()
                .resideInAPackage("io.jhdf..")
                .check(HOUSE);
        noClasses()
                .that()
                .resideOutsideOfPackage("org.whither.render..")
                .should()
                .dependOnClassesThat()
                .resideInAnyPackage("com.jogamp..", "jogamp..")
                .check(HOUSE);
        noClasses()
                .that()
                .resideOutsideOfPackage("org.whither.io..")
                .should()
                .dependOnClassesThat()
                .resideInAnyPackage("picocli..", "javax.measure..", "tech.units..")
                .check(HOUSE);
        noClasses()
                .that()
                .resideInAnyPackage(
                        "org.whither.film..", "org.whither.trace..", "org.whither.fate..", "org.whither.eddy..")
                .should()
                .dependOnClassesThat()
                .resideInAnyPackage("java.io..", "java.nio.file..", "java.awt..", "com.fasterxml..")
                .check(HOUSE);
    }
}
