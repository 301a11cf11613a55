package org.whither.io.command;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.concurrent.CompletableFuture;
import java.util.concurrent.CompletionException;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.io.hdf5.FieldReader;

/**
 * A field file that was read.
 *
 * @param file where it is
 * @param sha256 its checksum, hexadecimal
 * @param flow the motion of its gas
 */
record FieldInput(Path file, String sha256, FilmFlow flow) {
    /** Reads a field file; refuses it as {@link FieldReader} does. */
    static FieldInput read(Path file, Talk talk) throws IOException {
        return read(file, Interpolation.CONSERVING, talk);
    }

    /** Reads the field file of a command line, with the interpolation asked for. */
    static FieldInput read(FieldParameter field, Talk talk) throws IOException {
        return read(field.file(), field.interpolation(), talk);
    }

    /** Reads a field file with the interpolation asked for. */
    static FieldInput read(Path file, Interpolation interpolation, Talk talk) throws IOException {
        try (Talk.Stretch stretch = talk.begin("Reading " + file.getFileName())) {
            CompletableFuture<String> checksum = CompletableFuture.supplyAsync(() -> sha256(file));
            Film film = FieldReader.read(file);
            stretch.accept(0.4);
            Memory.require(film, file);
            FilmFlow flow = interpolation.of(film);
            stretch.accept(0.9);
            return new FieldInput(file, joined(checksum), flow);
        }
    }

    /** Default folder of results: the file's name without its ending, with -whither. */
    Path defaultFolder() {
        String name = file.getFileName().toString();
        int dot = name.lastIndexOf('.');
        return Path.of((dot > 0 ? name.substring(0, dot) : name) + "-whither");
    }

    String title() {
        String title = flow.film().heading().title();
        return title == null || title.isBlank() ? file.getFileName().toString() : title;
    }

    private static String joined(CompletableFuture<String> checksum) throws IOException {
        try {
            return checksum.join();
        } catch (CompletionException e) {
            if (e.getCause() instanceof UncheckedIOException failure) {
                throw failure.getCause();
            }
            throw e;
        }
    }

    private static String sha256(Path file) {
        MessageDigest digest;
        try {
            digest = MessageDigest.getInstance("SHA-256");
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
        try (InputStream in = Files.newInputStream(file)) {
            byte[] bytes = new byte[1 << 18];
            for (int read = in.read(bytes); read >= 0; read = in.read(bytes)) {
                digest.update(bytes, 0, read);
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return HexFormat.of().formatHex(digest.digest());
    }
}
