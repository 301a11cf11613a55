package org.whither.io.command;

import java.io.IOException;
import java.io.InputStream;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.DigestInputStream;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
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
            FilmFlow flow = interpolation.of(FieldReader.read(file), file);
            stretch.accept(0.9);
            return new FieldInput(file, sha256(file), flow);
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

    private static String sha256(Path file) throws IOException {
        MessageDigest digest;
        try {
            digest = MessageDigest.getInstance("SHA-256");
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException(e);
        }
        try (InputStream in = new DigestInputStream(Files.newInputStream(file), digest)) {
            in.transferTo(java.io.OutputStream.nullOutputStream());
        }
        return HexFormat.of().formatHex(digest.digest());
    }
}
