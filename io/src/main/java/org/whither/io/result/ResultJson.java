package org.whither.io.result;

import com.fasterxml.jackson.core.JsonProcessingException;
import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import org.whither.fate.BorderBalance;
import org.whither.film.Film;
import org.whither.film.Validity;

/** Pieces that several JSON results share. SI units. */
public final class ResultJson {
    private static final ObjectMapper MAPPER = new ObjectMapper();

    private ResultJson() {}

    /** A JSON document as text, indented, with a line end. */
    public static String text(JsonNode node) {
        try {
            return MAPPER.writerWithDefaultPrettyPrinter().writeValueAsString(node) + "\n";
        } catch (JsonProcessingException e) {
            throw new IllegalStateException(e);
        }
    }

    static ObjectNode field(Film film, String file, String sha256) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("file", file);
        node.put("title", film.heading().title());
        node.put("sha256", sha256);
        return node;
    }

    static ObjectNode balance(BorderBalance balance) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("supply_in", balance.supplyIn());
        if (balance.supplyOut() > 0) {
            node.put("supply_out", balance.supplyOut());
        }
        node.put("inner_in", balance.innerIn());
        node.put("inner_out", balance.innerOut());
        node.put("outer_in", balance.outerIn());
        node.put("outer_out", balance.outerOut());
        if (balance.inflow() > 0) {
            node.put("closure", balance.closure());
        } else {
            node.putNull("closure");
        }
        return node;
    }

    static ObjectNode validity(Validity validity) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("reduced_reynolds", validity.reducedReynolds());
        node.put("knudsen", validity.knudsen());
        node.put("exit_mach", validity.exitMach());
        node.put("film_slope", validity.slope());
        return node;
    }
}
