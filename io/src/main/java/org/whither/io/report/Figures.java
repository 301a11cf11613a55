package org.whither.io.report;

import com.fasterxml.jackson.databind.JsonNode;
import freemarker.core.HTMLOutputFormat;
import freemarker.template.TemplateMethodModelEx;
import freemarker.template.TemplateModel;
import freemarker.template.TemplateModelException;
import java.math.BigDecimal;
import java.math.MathContext;
import java.util.List;
import java.util.Locale;
import org.whither.io.result.EngineerUnits;

/**
 * The figures of a page. A template asks for one by the JSON pointer (RFC 6901) of its value, its form and, where it is
 * told in another unit than in the JSON, a factor; the element that stands on the page carries all three, so that
 * machines and tests can follow it back.
 *
 * <p>Forms: {@code s4} four digits · {@code f0} … {@code f4} so many decimals · {@code g} three digits without idle
 * zeros · {@code g} three digits without
 * idle zeros · {@code e} one digit and a power of ten · {@code i} a whole number. A plus before the form shows the sign of a positive value too.
 */
final class Figures implements TemplateMethodModelEx {
    private static final int GROUPED_FROM = 10_000;

    private final JsonNode numbers;

    Figures(JsonNode numbers) {
        this.numbers = numbers;
    }

    @Override
    // The library declares its list without a type.
    public TemplateModel exec(@SuppressWarnings("rawtypes") List arguments) throws TemplateModelException {
        // The list is raw in the library's interface.
        String pointer = arguments.get(0).toString();
        String form = arguments.get(1).toString();
        double factor =
                arguments.size() > 2 ? Double.parseDouble(arguments.get(2).toString()) : 1;
        JsonNode value = numbers.at(pointer);
        if (!value.isNumber()) {
            throw new TemplateModelException("the numbers of a report have none at " + pointer);
        }
        return HTMLOutputFormat.INSTANCE.fromMarkup(String.format(
                Locale.ROOT,
                "<data value=\"%s\" data-at=\"%s\"%s>%s</data>",
                value.asText(),
                pointer,
                factor == 1 ? "" : " data-times=\"" + arguments.get(2) + "\"",
                text(factor * value.asDouble(), form)));
    }

    /** A number in a form, with a real minus and thin spaces between thousands. */
    static String text(double value, String form) {
        boolean signed = form.startsWith("+");
        String kind = signed ? form.substring(1) : form;
        String text = switch (kind.charAt(0)) {
            case 's' -> EngineerUnits.digits(value);
            case 'f' -> String.format(Locale.ROOT, "%." + kind.substring(1) + "f", value);
            case 'g' ->
                new BigDecimal(value, new MathContext(3)).stripTrailingZeros().toPlainString();
            case 'e' ->
                value == 0 ? "0" : String.format(Locale.ROOT, "%.0e", value).replaceAll("e([+-])0", "e$1");
            case 'i' -> String.format(Locale.ROOT, "%.0f", value);
            default -> throw new IllegalArgumentException("no form of a figure is called " + form);
        };
        text = text.replaceAll("e([+-])0", "e$1");
        if (text.matches("-0\\.?0*")) {
            text = text.substring(1);
        }
        if (text.matches("-?\\d+") && Math.abs(value) >= GROUPED_FROM) {
            text = String.format(Locale.ROOT, "%,d", Long.parseLong(text)).replace(',', '\u202f');
        }
        return (signed && value > 0 ? "+" : "") + text.replace('-', '\u2212');
    }
}
