package org.whither.io.launch;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertFalse;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.io.IOException;
import java.io.RandomAccessFile;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.Instant;
import java.util.List;
import java.util.Map;
import org.junit.jupiter.api.BeforeEach;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.condition.EnabledOnOs;
import org.junit.jupiter.api.condition.OS;
import org.junit.jupiter.api.io.TempDir;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;
import org.whither.io.launch.FakeMachine.Outcome;
import org.whither.io.launch.FakeMachine.Running;

/** The scripts {@code whither} and {@code setup.sh}, on machines that lack one thing or another. */
@EnabledOnOs(OS.LINUX)
class LaunchTest {
    private static final String BUILD = "mvn -B -ntp -Dstyle.color=never -q -Dmaven.test.skip=true package";

    @TempDir
    Path folder;

    private FakeMachine machine;

    @BeforeEach
    void startWithABareMachine() throws IOException {
        machine = new FakeMachine(folder.toRealPath());
    }

    private void equip() {
        machine.jdk("17.0.15");
        machine.maven("3.8.7", FakeMachine.makeProgram());
        machine.packages(FakeMachine.ALL_PACKAGES);
    }

    // ---- whither ----

    @Test
    void whither_notBuilt_buildsOnceThenStartsAtOnce() {
        equip();
        Outcome first = machine.sh("io/whither", "demo");
        Outcome second = machine.sh("io/whither", "demo");
        assertEquals(7, first.status(), first.errors());
        assertEquals(first.output(), second.output());
        assertTrue(first.errors().contains("building the program"), first.errors());
        assertEquals("", second.errors());
        assertEquals(List.of(BUILD), machine.calls());
    }

    @Test
    void whither_throughSymbolicLinksFromElsewhere_passesArgumentsAndStatus() throws IOException {
        equip();
        Path places = Files.createDirectory(folder.resolve("places"));
        Files.createSymbolicLink(places.resolve("direct"), Path.of("../a house/io/whither"));
        Files.createSymbolicLink(places.resolve("indirect"), Path.of("direct"));
        Outcome outcome = machine.run(
                places,
                Map.of("WHITHER_JAVA_OPTS", "-Xmx1g -Dstar=*"),
                "/bin/sh",
                "./indirect",
                "split",
                "two  words",
                "*",
                "");
        assertEquals(7, outcome.status(), outcome.errors());
        assertEquals(
                "<--enable-native-access=ALL-UNNAMED><-Xmx1g><-Dstar=*><-jar><"
                        + machine.house.toRealPath().resolve("io/target/whither.jar")
                        + "><split><two  words><*><>",
                outcome.output());
    }

    /** The Vector API announces itself, so it is for fields whose tracing is long, where the Java at hand has it. */
    @Test
    void whither_largeField_getsTheVectorApi() throws IOException {
        equip();
        Path small = Files.writeString(folder.resolve("small.h5"), "small");
        Path large = folder.resolve("large field.h5");
        try (RandomAccessFile file = new RandomAccessFile(large.toFile(), "rw")) {
            file.setLength(80L << 20);
        }
        String vectors = "<--add-modules><jdk.incubator.vector>";
        assertFalse(machine.sh("io/whither", "split", large.toString()).output().contains(vectors));
        Files.writeString(machine.jdk("17.0.15").resolve("bin/java"), """
                #!/bin/sh
                case $1 in --list-modules) echo jdk.incubator.vector@17.0.15; exit 0 ;; esac
                printf '<%s>' "$@"; exit 7
                """);
        Outcome outcome = machine.sh("io/whither", "split", large.toString());
        assertEquals(7, outcome.status(), outcome.errors());
        assertTrue(outcome.output().contains(vectors), outcome.output());
        assertTrue(outcome.output().endsWith("<split><" + large + ">"), outcome.output());
        assertFalse(machine.sh("io/whither", "split", small.toString()).output().contains(vectors));
    }

    @Test
    void whither_twoFirstStartsAtOnce_buildOnce() {
        equip();
        Running one = machine.start(machine.house, Map.of(), "/bin/sh", "io/whither", "one");
        Running two = machine.start(machine.house, Map.of(), "/bin/sh", "io/whither", "two");
        Outcome first = machine.finish(one);
        Outcome second = machine.finish(two);
        assertTrue(first.output().endsWith("<one>"), first.errors());
        assertTrue(second.output().endsWith("<two>"), second.errors());
        assertEquals(List.of(BUILD), machine.calls());
    }

    @Test
    void whither_sourceNewerThanProgram_buildsAgain() {
        equip();
        machine.sh("io/whither");
        machine.source("core/src/test/java/FilmTest.java");
        machine.setTime(
                machine.house.resolve("core/src/test/java/FilmTest.java"),
                Instant.now().plusSeconds(60));
        machine.sh("io/whither");
        assertEquals(1, machine.calls().size(), "a test is no source of the program");

        Path program = machine.house.resolve("io/target/whither.jar");
        machine.setTime(program, Instant.now().minusSeconds(120));
        machine.setTime(
                machine.house.resolve("core/src/main/java/Film.java"),
                Instant.now().minusSeconds(60));
        machine.sh("io/whither");
        machine.sh("io/whither");
        assertEquals(List.of(BUILD, BUILD), machine.calls());
    }

    @Test
    void whither_buildBrokenOff_buildsAgain() throws IOException {
        equip();
        machine.sh("io/whither");
        Files.createFile(machine.house.resolve("io/target/half-built"));
        assertEquals(7, machine.sh("io/whither").status());
        assertEquals(7, machine.sh("io/whither").status());
        assertEquals(List.of(BUILD, BUILD), machine.calls());
    }

    @Test
    void whither_buildFails_showsWhatMavenSaidAndDoesNotStart() {
        equip();
        machine.maven("3.8.7", FakeMachine.makeProgram() + "; echo '[ERROR] a semicolon is missing'; exit 1");
        for (int i = 0; i < 2; i++) {
            Outcome outcome = machine.sh("io/whither");
            assertEquals(1, outcome.status());
            assertEquals("", outcome.output());
            assertTrue(outcome.errors().contains("[ERROR] a semicolon is missing"), outcome.errors());
        }
    }

    @Test
    void whither_startedByItsOwnBuild_refusesInsteadOfWaitingForEver() {
        equip();
        machine.maven("3.8.7", "exec /bin/sh io/whither");
        Outcome outcome = machine.sh("io/setup.sh", "build");
        assertEquals(1, outcome.status());
        assertTrue(outcome.errors().contains("from its own build"), outcome.errors());
    }

    @Test
    void whither_builtButNoJavaAnyMore_saysSo() throws IOException {
        equip();
        machine.sh("io/whither");
        Files.delete(folder.toRealPath().resolve("jvm/jdk-17.0.15/bin/java"));
        Outcome outcome = machine.sh("io/whither");
        assertEquals(3, outcome.status());
        assertTrue(outcome.errors().contains("no Java of version 17 or later"), outcome.errors());
    }

    // ---- setup.sh ----

    @Test
    void setup_ordinaryUserOnBareMachine_namesPackagesAndStops() {
        Outcome outcome = machine.sh("io/whither", "demo");
        assertEquals(3, outcome.status());
        assertEquals("", outcome.output());
        assertTrue(outcome.errors().contains("a JDK (javac), version 17 or later, and Maven"), outcome.errors());
        String packages = FakeMachine.ALL_PACKAGES.replace(" python3-h5py hdf5-tools ffmpeg chromium", "");
        String command = "su -c 'apt-get update && apt-get install -y --no-install-recommends ";
        assertTrue(outcome.errors().contains(command), outcome.errors());
        assertTrue(outcome.errors().contains("jdk-headless maven " + packages + "'"), outcome.errors());
        assertEquals(List.of(), machine.calls());
    }

    @Test
    void setup_mavenTooOld_saysWhichItFound() {
        equip();
        machine.maven("3.6.2", FakeMachine.makeProgram());
        Outcome outcome = machine.sh("io/setup.sh");
        assertEquals(3, outcome.status());
        assertTrue(outcome.errors().contains("Maven, version 3.6.3 or later"), outcome.errors());
        assertTrue(outcome.errors().contains("mvn is 3.6.2"), outcome.errors());
        assertFalse(outcome.errors().contains("a JDK"), outcome.errors());
    }

    @Test
    void setup_onlyMesaMissing_warnsAndGoesOn() {
        equip();
        machine.packages(FakeMachine.ALL_PACKAGES.replace("libgl1-mesa-dri ", ""));
        Outcome outcome = machine.sh("io/whither", "demo");
        assertEquals(7, outcome.status(), outcome.errors());
        assertTrue(
                outcome.errors().contains("numbers but no pictures, as these are not installed: libgl1-mesa-dri."),
                outcome.errors());
        assertEquals(List.of(BUILD), machine.calls());
    }

    @Test
    void setup_root_fetchesListsOnlyWhenNeededAndInstallsWhatIsMissing() {
        equip();
        machine.tool("id", "echo 0");
        machine.packages(FakeMachine.ALL_PACKAGES.replace("libgles2 ", "").replace(" hdf5-tools", ""));
        machine.tool("apt-get", """
                echo "$DEBIAN_FRONTEND apt-get $*" >>'FOLDER/calls'
                case $* in
                  *update) echo yes >'FOLDER/lists' ;;
                  *) [ -e 'FOLDER/lists' ] || exit 100; printf ' libgles2 hdf5-tools' >>'FOLDER/packages' ;;
                esac""");
        Outcome outcome = machine.sh("io/setup.sh", "test");
        assertEquals(0, outcome.status(), outcome.errors());
        String apt = "noninteractive apt-get -o DPkg::Lock::Timeout=300 ";
        String install = apt + "install -y --no-install-recommends libgles2 hdf5-tools";
        assertEquals(
                List.of(install, apt + "update", install, "mvn -B -ntp -Dstyle.color=never verify"), machine.calls());
        assertEquals("whither setup: installing with apt-get: libgles2 hdf5-tools\n", outcome.errors());
    }

    @Test
    void setup_javaHomeTooOld_usesTheNewestOtherAndSaysSo() {
        equip();
        Path newest = machine.jdk("21.0.2");
        Path old = machine.jdk("1.8.0_392");
        Outcome outcome = machine.run(machine.house, Map.of("JAVA_HOME", old.toString()), "/bin/sh", "io/setup.sh");
        assertEquals(0, outcome.status(), outcome.errors());
        assertTrue(outcome.errors().contains("using " + newest), outcome.errors());
        assertTrue(outcome.errors().contains("ready: JDK 21, Maven 3.8.7"), outcome.errors());
    }

    @Test
    void setup_testsFail_endsWithOne() {
        equip();
        machine.maven("3.8.7", "echo 'Tests run: 3, Failures: 1'; exit 1");
        Outcome outcome = machine.sh("io/setup.sh", "test");
        assertEquals(1, outcome.status());
        assertEquals("Tests run: 3, Failures: 1\n", outcome.output());
    }

    @Test
    void setup_unknownWord_isWrongUsage() {
        assertEquals(2, machine.sh("io/setup.sh", "install").status());
        assertEquals(2, machine.sh("io/setup.sh", "test", "build").status());
    }

    @ParameterizedTest
    @CsvSource({
        "3.6.3, 3.6.3, 0",
        "3.6.2, 3.6.3, 1",
        "3.10, 3.6.3, 0",
        "3.6, 3.6.3, 1",
        "4.0.0-rc-3, 3.6.3, 0",
        "3.6.3-5, 3.6.3, 0",
        "2.9.9, 3.6.3, 1",
        "0, 3.6.3, 1"
    })
    void atLeast_comparesNumberByNumber(String have, String want, int status) {
        assertEquals(
                status,
                machine.sh("-c", ". io/setup.sh; at_least " + have + " " + want).status());
    }

    @ParameterizedTest
    @CsvSource({
        "javac 17.0.15, 17",
        "javac 18-ea, 18",
        "javac 1.8.0_392, 8",
        "'openjdk version \"21.0.2\" 2024-01-16', 21",
        "'java version \"1.8.0_392\"', 8",
        "'Picked up JAVA_TOOL_OPTIONS: -Xmx1g\njavac 25', 25",
        "no such thing, 0"
    })
    void javaVersion_isReadFromWhatTheToolSays(String says, int major) {
        Path home = machine.jdk("none");
        assertTrue(home.resolve("release").toFile().delete());
        machine.tool("../jvm/jdk-none/bin/javac", "cat >&2 <<'END'\n" + says + "\nEND");
        Outcome outcome = machine.sh("-c", ". io/setup.sh; java_version '" + home + "' javac; echo $major");
        assertEquals(major + "\n", outcome.output(), outcome.errors());
    }
}
