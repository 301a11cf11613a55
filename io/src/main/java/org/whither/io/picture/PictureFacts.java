package org.whither.io.picture;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import org.whither.io.result.Cautions;

/**
 * Where a picture came from.
 *
 * @param title its title
 * @param field the field, or the fields, it was drawn of
 * @param caution what must be known of it
 */
public record PictureFacts(String title, JsonNode field, String caution) {
    /** Of one field file. */
    public static PictureFacts of(String title, String file, String sha256) {
        return new PictureFacts(title, field(file, sha256), Cautions.TEXT);
    }

    /** Of two field files. */
    public static PictureFacts of(String title, String file, String sha256, String otherFile, String otherSha256) {
        return new PictureFacts(
                title,
                JsonNodeFactory.instance.arrayNode().add(field(file, sha256)).add(field(otherFile, otherSha256)),
                Cautions.TEXT);
    }

    private static ObjectNode field(String file, String sha256) {
        return JsonNodeFactory.instance.objectNode().put("file", file).put("sha256", sha256);
    }
}
