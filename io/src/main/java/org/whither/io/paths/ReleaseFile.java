package org.whither.io.paths;

import com.fasterxml.jackson.core.JsonFactory;
import com.fasterxml.jackson.core.JsonLocation;
import com.fasterxml.jackson.core.JsonParser;
import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.core.JsonToken;
import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.charset.CharacterCodingException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.Locale;
import org.whither.film.FilmGrid;
import org.whither.io.file.RefusedInput;
import org.whither.trace.Release;

/**
 * Reads points of release from a file. As CSV: a row a point, θ (rad), radius (m), σ, under the names {@code theta_rad},
 * {@code radius_m} and {@code sigma} in any order among other columns, or without a line of names in this order; blank lines
 * and lines that start with # are passed over. As JSON: an array of objects with the numbers {@code theta}, {@code radius}
 * and {@code sigma}. Every fault is told with the number of its line.
 */
public final class ReleaseFile {
    private static final String[] COLUMNS = {"theta_rad", "radius_m", "sigma"};
    private static final String[] KEYS = {"theta", "radius", "sigma"};
    private static final long MOST_BYTES = 1L << 30;

    private final Path file;
    private final FilmGrid grid;
    private final List<Release> releases = new ArrayList<>();

    private ReleaseFile(Path file, FilmGrid grid) {
        this.file = file;
        this.grid = grid;
    }

    /**
     * Reads a file.
     *
     * @param file the file; one whose first sign is [ or { is taken as JSON
     * @param grid the face on which the points must lie
     * @return the releases in order, at least one
     * @throws RefusedInput where a line is broken or a point lies outside the film
     * @throws IOException where the file cannot be read
     */
    public static List<Release> read(Path file, FilmGrid grid) throws IOException {
        ReleaseFile reading = new ReleaseFile(file, grid);
        if (Files.isDirectory(file)) {
            throw RefusedInput.of(file, "it is a folder", "a CSV or JSON file of points", "name a file");
        }
        if (!Files.exists(file)) {
            throw RefusedInput.of(file, "there is no such file", "a CSV or JSON file of points", "check the name");
        }
        if (Files.size(file) > MOST_BYTES) {
            throw RefusedInput.of(
                    file,
                    "it has " + Files.size(file) + " bytes",
                    "at most " + MOST_BYTES,
                    "divide it into several files and give each with --release file:NAME");
        }
        String text = reading.text();
        String trimmed = text.stripLeading();
        if (trimmed.startsWith("[") || trimmed.startsWith("{")) {
            reading.json(text);
        } else {
            reading.csv(text);
        }
        if (reading.releases.isEmpty()) {
            throw RefusedInput.of(file, "it holds no point", "at least one point of release", "add one");
        }
        return reading.releases;
    }

    private String text() throws IOException {
        byte[] bytes = Files.readAllBytes(file);
        try {
            String text = StandardCharsets.UTF_8
                    .newDecoder()
                    .decode(ByteBuffer.wrap(bytes))
                    .toString();
            return text.startsWith("\uFEFF") ? text.substring(1) : text;
        } catch (CharacterCodingException e) {
            throw RefusedInput.of(
                    file, "it is not text in UTF-8", "a CSV or JSON file of points", "save it as UTF-8", e);
        }
    }

    /** Adds a point, or refuses it. */
    private void add(int line, double theta, double radius, double sigma) {
        String fault = fault(grid, theta, radius, sigma);
        if (fault != null) {
            throw broken(line, fault);
        }
        releases.add(new Release(theta, radius, sigma, 0));
    }

    private RefusedInput broken(int line, String fault) {
        return new RefusedInput(file + ": line " + line + ": " + fault + ".");
    }

    /**
     * What is wrong with a point of release: found, expected and how to mend it, without a full stop; null where nothing is.
     *
     * @param grid the face on which it must lie
     * @param theta angle (rad)
     * @param radius radius (m)
     * @param sigma height above the rotor face as a fraction of the film thickness
     */
    public static String fault(FilmGrid grid, double theta, double radius, double sigma) {
        if (!(Math.abs(theta) <= 1e6)) {
            return "the angle is " + theta + "; expected a number of radians from -1e6 to 1e6; correct it";
        }
        if (!(radius >= grid.innerRadius() && radius <= grid.outerRadius())) {
            return "the radius is " + radius + " m, outside the film; expected " + grid.innerRadius() + " to "
                    + grid.outerRadius() + " m; "
                    + (radius > 1 && radius / 1000 >= grid.innerRadius() && radius / 1000 <= grid.outerRadius()
                            ? "give it in metres, not millimetres"
                            : "correct it");
        }
        if (!(sigma >= 0 && sigma <= 1)) {
            return "the height is " + sigma
                    + ", outside the film; expected a fraction of the film thickness from 0 at the"
                    + " rotor face to 1 at the stator face; correct it";
        }
        return null;
    }

    // ---- CSV -------------------------------------------------------------------------------------------------------

    private void csv(String text) {
        int[] order = null;
        int fields = 3;
        String[] lines = text.split("\r\n|\n|\r", -1);
        for (int n = 0; n < lines.length; n++) {
            String line = lines[n].strip();
            if (line.isEmpty() || line.startsWith("#")) {
                continue;
            }
            String[] cells = Arrays.stream(line.split(",", -1))
                    .map(cell -> cell.strip().replaceAll("^\"(.*)\"$", "$1"))
                    .toArray(String[]::new);
            if (order == null) {
                order = order(cells);
                if (order != null) {
                    fields = cells.length;
                    continue;
                }
                order = new int[] {0, 1, 2};
            }
            if (cells.length != fields) {
                throw broken(
                        n + 1,
                        "it has " + cells.length + (cells.length == 1 ? " value" : " values") + "; expected " + fields
                                + ", separated by commas; correct the line");
            }
            double[] point = new double[3];
            for (int c = 0; c < 3; c++) {
                try {
                    point[c] = Double.parseDouble(cells[order[c]]);
                } catch (NumberFormatException e) {
                    throw broken(
                            n + 1,
                            COLUMNS[c] + " is \"" + shortened(cells[order[c]])
                                    + "\"; expected a number such as 0.0585; correct the line");
                }
            }
            add(n + 1, point[0], point[1], point[2]);
        }
    }

    /** Where the columns stand in a line of names; null where the line holds no name at all. */
    private static int[] order(String[] cells) {
        List<String> names =
                Arrays.stream(cells).map(cell -> cell.toLowerCase(Locale.ROOT)).toList();
        int[] order = new int[3];
        for (int c = 0; c < 3; c++) {
            order[c] = names.contains(COLUMNS[c]) ? names.indexOf(COLUMNS[c]) : names.indexOf(KEYS[c]);
            if (order[c] < 0) {
                return null;
            }
        }
        return order;
    }

    private static String shortened(String text) {
        return text.length() > 40 ? text.substring(0, 40) + "…" : text;
    }

    // ---- JSON ------------------------------------------------------------------------------------------------------

    private void json(String text) throws IOException {
        try (JsonParser parser = new JsonFactory().createParser(text)) {
            if (parser.nextToken() != JsonToken.START_ARRAY) {
                throw broken(
                        1,
                        "it begins with an object; expected an array of points such as [{\"theta\": 0, \"radius\": 0.058,"
                                + " \"sigma\": 0.5}]; put the points into an array");
            }
            while (parser.nextToken() != JsonToken.END_ARRAY) {
                point(parser);
            }
            if (parser.nextToken() != null) {
                throw broken(line(parser), "something follows the array of points; expected its end; take it away");
            }
        } catch (JsonProcessingException e) {
            JsonLocation at = e.getLocation();
            throw new RefusedInput(
                    file + ": line " + (at == null ? 1 : at.getLineNr())
                            + ": it is not JSON; expected an array of points; correct the line.",
                    e);
        }
    }

    private static int line(JsonParser parser) {
        return parser.currentTokenLocation().getLineNr();
    }

    private void point(JsonParser parser) throws IOException {
        int line = line(parser);
        if (parser.currentToken() != JsonToken.START_OBJECT) {
            throw broken(
                    line,
                    "a point is " + shortened(String.valueOf(parser.getText()))
                            + "; expected an object with the numbers theta, radius and sigma; correct it");
        }
        double[] point = {Double.NaN, Double.NaN, Double.NaN};
        boolean[] given = new boolean[3];
        while (parser.nextToken() != JsonToken.END_OBJECT) {
            String key = parser.currentName();
            int c = Arrays.asList(KEYS).indexOf(key);
            c = c < 0 ? Arrays.asList(COLUMNS).indexOf(key) : c;
            JsonToken value = parser.nextToken();
            if (c < 0) {
                parser.skipChildren();
            } else if (value != null && value.isNumeric()) {
                point[c] = parser.getDoubleValue();
                given[c] = true;
            } else {
                throw broken(
                        line(parser),
                        key + " is " + shortened(String.valueOf(parser.getText()))
                                + "; expected a number such as 0.0585; correct it");
            }
        }
        for (int c = 0; c < 3; c++) {
            if (!given[c]) {
                throw broken(
                        line, "a point has no " + KEYS[c] + "; expected the numbers theta, radius and sigma; add it");
            }
        }
        add(line, point[0], point[1], point[2]);
    }
}
