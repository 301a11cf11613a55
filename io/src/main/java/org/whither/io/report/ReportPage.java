package org.whither.io.report;

import com.fasterxml.jackson.core.type.TypeReference;
import com.fasterxml.jackson.databind.ObjectMapper;
import com.fasterxml.jackson.databind.node.ObjectNode;
import freemarker.core.TemplateClassResolver;
import freemarker.template.Configuration;
import freemarker.template.TemplateException;
import freemarker.template.TemplateExceptionHandler;
import java.io.IOException;
import java.io.InputStream;
import java.io.StringWriter;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.time.ZonedDateTime;
import java.time.format.DateTimeFormatter;
import java.util.Base64;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.whither.io.result.Cautions;
import org.whither.io.result.ResultJson;

/** The page of a report: one HTML document with everything in it. */
public final class ReportPage {
    private static final Configuration TEMPLATES = templates();

    private ReportPage() {}

    /**
     * What a page is to be like beside its numbers.
     *
     * @param plain without the tables for specialists
     * @param made when it is made; stands on the page alone
     * @param command the command line that makes it again
     * @param noPictures why there are no pictures, or empty
     * @param animation name of an animation that lies beside the page, or empty
     */
    public record Settings(
            boolean plain,
            ZonedDateTime made,
            String command,
            Optional<String> noPictures,
            Optional<String> animation) {}

    /**
     * Makes the page.
     *
     * @param numbers the numbers of the report ({@link ReportNumbers})
     * @param pictures the pictures in their order
     * @param settings what it is to be like
     * @return the page, to be written as UTF-8
     */
    public static String of(ObjectNode numbers, List<ReportPicture> pictures, Settings settings) {
        ObjectMapper mapper = new ObjectMapper();
        Map<String, Object> model = new HashMap<>();
        model.put("j", mapper.convertValue(numbers, new TypeReference<Map<String, Object>>() {}));
        model.put("n", new Figures(numbers));
        model.put("style", resource("page.css"));
        model.put("pictures", pictures);
        model.put("charts", ReportCharts.of(numbers));
        model.put("plain", settings.plain());
        model.put("made", settings.made().format(DateTimeFormatter.ofPattern("d MMMM yyyy, HH:mm", Locale.ENGLISH)));
        model.put("madeIso", settings.made().format(DateTimeFormatter.ISO_OFFSET_DATE_TIME));
        model.put("command", settings.command());
        model.put("noPictures", settings.noPictures().orElse(""));
        model.put("animation", settings.animation().orElse(""));
        model.put("cautions", Cautions.SENTENCES);
        model.put(
                "json",
                Base64.getEncoder().encodeToString(ResultJson.text(numbers).getBytes(StandardCharsets.UTF_8)));
        StringWriter page = new StringWriter();
        try {
            TEMPLATES.getTemplate("page.ftlh").process(model, page);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        } catch (TemplateException e) {
            throw new IllegalStateException(e);
        }
        return page.toString();
    }

    private static Configuration templates() {
        Configuration configuration = new Configuration(Configuration.VERSION_2_3_34);
        configuration.setClassForTemplateLoading(ReportPage.class, "");
        configuration.setDefaultEncoding("UTF-8");
        configuration.setLocale(Locale.ROOT);
        configuration.setNumberFormat("c");
        // What ends in .ftlh is HTML, and every value is escaped for it.
        configuration.setRecognizeStandardFileExtensions(true);
        configuration.setTemplateExceptionHandler(TemplateExceptionHandler.RETHROW_HANDLER);
        configuration.setLogTemplateExceptions(false);
        configuration.setNewBuiltinClassResolver(TemplateClassResolver.ALLOWS_NOTHING_RESOLVER);
        return configuration;
    }

    private static String resource(String name) {
        try (InputStream in = ReportPage.class.getResourceAsStream(name)) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
