package org.whither.io.launch;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.attribute.FileTime;
import java.nio.file.attribute.PosixFilePermissions;
import java.time.Instant;
import java.util.List;
import java.util.Map;
import java.util.concurrent.TimeUnit;
import java.util.stream.Stream;

/**
 * A machine for the start scripts to run on: a clone with the real scripts, and a PATH on which only everyday tools are
 * real. Maven, Java, the package tools and the account are scripts of this class, so that no test builds, installs or
 * reaches a network. Each of them notes in {@code calls} how it was called.
 */
final class FakeMachine {
    private static final List<String> EVERYDAY_TOOLS = List.of(
            "cat",
            "sh",
            "dirname",
            "env",
            "find",
            "flock",
            "grep",
            "mkdir",
            "mktemp",
            "readlink",
            "rm",
            "sed",
            "sleep",
            "tail",
            "touch",
            "tr");
    static final String ALL_PACKAGES = "libegl1 libegl-mesa0 libgl1 libgl1-mesa-dri libgles2 libxrender1 "
            + "libfreetype6 libharfbuzz0b fontconfig fonts-dejavu-core python3-h5py hdf5-tools ffmpeg chromium";

    /** The top of the clone; its name has a space in it. */
    final Path house;

    private final Path folder;
    private final Path bin;

    /** What one run of a script printed on both outputs, and its exit status. */
    record Outcome(int status, String output, String errors) {}

    /** A machine of an ordinary user without sudo; nothing but the everyday tools is there. */
    FakeMachine(Path folder) {
        this.folder = folder;
        house = folder.resolve("a house");
        bin = folder.resolve("bin");
        try {
            Files.createDirectories(bin);
            Files.createDirectories(folder.resolve("jvm"));
            Files.createDirectories(house.resolve(".git"));
            Files.createDirectories(house.resolve("io"));
            for (String tool : EVERYDAY_TOOLS) {
                Path real = Stream.of("/usr/bin", "/bin")
                        .map(place -> Path.of(place, tool))
                        .filter(Files::isExecutable)
                        .findFirst()
                        .orElseThrow(() -> new IllegalStateException("this machine has no " + tool));
                tool(tool, "exec " + real + " \"$@\"");
            }
            Path scripts = Path.of(System.getProperty("basedir", "."));
            Files.copy(scripts.resolve("whither"), house.resolve("io/whither"));
            String setup = Files.readString(scripts.resolve("setup.sh"));
            String elsewhere = setup.replace("jvm_folder=/usr/lib/jvm", "jvm_folder='" + folder.resolve("jvm") + "'");
            if (elsewhere.equals(setup)) {
                throw new IllegalStateException("setup.sh has no line jvm_folder=/usr/lib/jvm to turn elsewhere");
            }
            Files.writeString(house.resolve("io/setup.sh"), elsewhere);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        source("pom.xml");
        source("core/src/main/java/Film.java");
        tool("uname", "echo Linux");
        tool("id", "echo 1000");
        packages("");
        tool("dpkg-query", """
                shift 2
                for package in "$@"; do
                  case " $(cat 'FOLDER/packages') " in *" $package "*) printf 'installed=%s ' "$package" ;; esac
                done""");
        tool("apt-get", "exit 100");
        tool("apt-cache", "exit 100");
    }

    /** Puts a JDK of the given version under {@code jvm}; its {@code java} prints its arguments and ends with 7. */
    Path jdk(String version) {
        Path home = folder.resolve("jvm").resolve("jdk-" + version);
        write(home.resolve("release"), "IMPLEMENTOR=\"none\"\nJAVA_VERSION=\"" + version + "\"\n");
        executable(home.resolve("bin/java"), "printf '<%s>' \"$@\"; exit 7");
        executable(home.resolve("bin/javac"), "exit 1");
        return home;
    }

    /** Puts a Maven of the given version on the PATH; {@code build} is the shell text that it runs to build. */
    void maven(String version, String build) {
        tool("mvn", """
                case "$*" in *-v) echo 'Apache Maven VERSION (none)'; exit 0 ;; esac
                echo "mvn $*" >>'FOLDER/calls'
                """.replace("VERSION", version) + build);
    }

    /** The shell text of a build that makes what Maven makes; like Maven it leaves a program alone that is there. */
    static String makeProgram() {
        return "sleep 0.3; mkdir -p io/target/lib; [ -e io/target/whither.jar ] || echo made >io/target/whither.jar";
    }

    /** Says which packages are installed. */
    void packages(String names) {
        write(folder.resolve("packages"), names);
    }

    /** Puts a script on the PATH; FOLDER in its text stands for the machine's folder. */
    void tool(String name, String text) {
        executable(bin.resolve(name), text.replace("FOLDER", folder.toString()));
    }

    /** Writes a source of the clone, with a time well in the past. */
    void source(String name) {
        Path file = house.resolve(name);
        write(file, "// " + name + "\n");
        setTime(file, Instant.now().minusSeconds(3600));
    }

    void setTime(Path file, Instant time) {
        try {
            Files.setLastModifiedTime(file, FileTime.from(time));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** The lines noted by the tools. */
    List<String> calls() {
        try {
            Path calls = folder.resolve("calls");
            return Files.exists(calls) ? Files.readAllLines(calls) : List.of();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** Runs the command in the given folder with only this machine's tools, and waits for it. */
    Outcome run(Path where, Map<String, String> environment, String... command) {
        return finish(start(where, environment, command));
    }

    /** Runs {@code sh} with the arguments given, at the top of the clone. */
    Outcome sh(String... arguments) {
        return run(
                house,
                Map.of(),
                Stream.concat(Stream.of("/bin/sh"), Stream.of(arguments)).toArray(String[]::new));
    }

    /** A run that was started; its outputs go to files, so that it never waits for a reader. */
    record Running(Process process, Path output, Path errors) {}

    Running start(Path where, Map<String, String> environment, String... command) {
        try {
            Path output = Files.createTempFile(folder, "output", "");
            Path errors = Files.createTempFile(folder, "errors", "");
            ProcessBuilder builder = new ProcessBuilder(command)
                    .directory(where.toFile())
                    .redirectInput(Path.of("/dev/null").toFile())
                    .redirectOutput(output.toFile())
                    .redirectError(errors.toFile());
            builder.environment().clear();
            builder.environment().put("PATH", bin.toString());
            builder.environment().putAll(environment);
            return new Running(builder.start(), output, errors);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    Outcome finish(Running running) {
        try {
            if (!running.process().waitFor(60, TimeUnit.SECONDS)) {
                running.process().destroyForcibly();
                throw new IllegalStateException("a script did not end within 60 s");
            }
            return new Outcome(
                    running.process().exitValue(),
                    Files.readString(running.output()),
                    Files.readString(running.errors()));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        } catch (InterruptedException e) {
            Thread.currentThread().interrupt();
            throw new IllegalStateException("interrupted while a script ran", e);
        }
    }

    private static void executable(Path file, String text) {
        write(file, "#!/bin/sh\n" + text + "\n");
        try {
            Files.setPosixFilePermissions(file, PosixFilePermissions.fromString("rwxr-xr-x"));
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    private static void write(Path file, String text) {
        try {
            Files.createDirectories(file.getParent());
            Files.writeString(file, text);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
