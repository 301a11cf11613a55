package org.whither.io.paths;

import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.JsonNodeFactory;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Closeable;
import java.io.Flushable;
import java.io.IOException;
import java.io.Writer;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import org.whither.io.result.Cautions;
import org.whither.io.result.ResultJson;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;

/** What became of each tracer, one a line, within an account of the run. */
final class JsonOutput implements PathOutput<String> {
    private final Appendable out;
    private final Closeable closing;
    private boolean begun;

    JsonOutput(Appendable out, Closeable closing, PathAccount account) throws IOException {
        this.out = out;
        this.closing = closing;
        String head = ResultJson.text(head(account));
        out.append(head, 0, head.lastIndexOf('\n', head.lastIndexOf('}'))).append(",\n  \"tracers\" : [");
    }

    static JsonOutput toFile(Path file, PathAccount account) throws IOException {
        Writer writer = Files.newBufferedWriter(file);
        return new JsonOutput(writer, writer, account);
    }

    private static ObjectNode head(PathAccount account) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("result", "paths");
        node.put("version", 1);
        ObjectNode field = node.putObject("field");
        field.put("file", account.file());
        field.put("title", account.title());
        field.put("sha256", account.sha256());
        node.put("frame", account.frame().name().toLowerCase(Locale.ROOT));
        node.put("direction", account.course().name().toLowerCase(Locale.ROOT));
        node.put("until", account.until());
        node.put("tolerance", account.tolerance());
        node.put("seed", account.seed());
        node.put("points", account.points());
        node.put("interpolation", account.interpolation());
        ArrayNode releases = node.putArray("releases");
        account.releases().forEach(releases::add);
        return node;
    }

    @Override
    public String prepare(List<EndedPath> paths) {
        StringBuilder text = new StringBuilder();
        for (EndedPath each : paths) {
            text.append(text.length() > 0 ? ",\n    " : "").append(tracer(each));
        }
        return text.toString();
    }

    private static ObjectNode tracer(EndedPath each) {
        ObjectNode node = JsonNodeFactory.instance.objectNode();
        node.put("tracer", each.number());
        Release release = each.path().release();
        ObjectNode at = node.putObject("release");
        at.put("theta", release.theta());
        at.put("radius", release.radius());
        at.put("sigma", release.sigma());
        if (release.massFlow() > 0) {
            node.put("mass_flow", release.massFlow());
        }
        if (each.from() != null) {
            node.put("from", each.from().word());
        }
        if (each.fate() != null) {
            node.put("fate", each.fate().word());
        }
        node.put("residence_time", each.path().duration());
        node.put("revolutions", each.path().revolutions());
        node.put("points", each.path().size());
        each.path().before().ifPresent(end -> reason(node, end));
        each.path().after().ifPresent(end -> reason(node, end));
        return node;
    }

    private static void reason(ObjectNode node, PathEnd end) {
        if (end instanceof PathEnd.Failed failed) {
            node.put("reason", failed.reason());
        }
    }

    @Override
    public void write(String lines) throws IOException {
        out.append(begun ? ",\n    " : "\n    ").append(lines);
        begun = true;
    }

    @Override
    public void finish(PathTotals totals) throws IOException {
        ObjectNode tail = JsonNodeFactory.instance.objectNode();
        if (!totals.from().isEmpty()) {
            counts(tail.putObject("count_from"), totals.from());
        }
        if (!totals.fates().isEmpty()) {
            counts(tail.putObject("count_fate"), totals.fates());
        }
        tail.put("point_count", totals.points());
        tail.put("steps", totals.steps());
        tail.put("caution", Cautions.TEXT);
        String text = ResultJson.text(tail);
        out.append("\n  ],\n").append(text, text.indexOf('\n') + 1, text.length());
        if (out instanceof Flushable flushable) {
            flushable.flush();
        }
        closing.close();
    }

    private static void counts(ObjectNode node, Map<Fate, Integer> counts) {
        counts.forEach((fate, count) -> node.put(fate.word(), count));
    }

    @Override
    public void close() throws IOException {
        closing.close();
    }
}
