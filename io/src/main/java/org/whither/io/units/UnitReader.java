package org.whither.io.units;

import java.util.HashMap;
import java.util.Locale;
import java.util.Map;
import javax.measure.IncommensurableException;
import javax.measure.Unit;
import javax.measure.UnitConverter;
import javax.measure.format.MeasurementParseException;
import si.uom.NonSI;
import systems.uom.common.USCustomary;
import tech.units.indriya.AbstractUnit;
import tech.units.indriya.format.SimpleUnitFormat;
import tech.units.indriya.unit.Units;

/**
 * Understands the spelling of a unit. Single units and their prefixes are the units library's; on top stand the
 * everyday names it lacks ({@code um}, {@code bar}, {@code deg}, {@code rpm} …) and the ways in which products are
 * written in data files:
 *
 * <ul>
 *   <li>products as {@code kg*m}, {@code kg.m}, {@code kg·m} or {@code kg m};
 *   <li>quotients as {@code kg/m}; each stroke divides by the one factor that follows it, so that {@code kg/m^2/s} is
 *       kg/(m² s);
 *   <li>powers as {@code m^3}, {@code m**3}, {@code m3}, {@code m-3}, {@code m³} or {@code m⁻³};
 *   <li>brackets, as in {@code kg/(m^2*s)}; a pure number as {@code 1} or an empty text.
 * </ul>
 *
 * Angles are kept apart from pure numbers: {@code rad} is no spelling of a pure number, nor {@code 1/s} of a rotation
 * rate.
 */
public final class UnitReader {
    private static final SimpleUnitFormat LIBRARY = SimpleUnitFormat.getNewInstance();
    private static final Map<String, Product> EVERYDAY = everyday();
    private static final String SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";
    private static final double WHOLE_TOLERANCE = 1e-14;

    private final String text;
    private int at;

    /** A product of units, and to which power angles stand in it. */
    private record Product(Unit<?> unit, int angles) {
        static final Product ONE = new Product(AbstractUnit.ONE, 0);

        Product times(Product other) {
            return new Product(unit.multiply(other.unit), angles + other.angles);
        }

        Product over(Product other) {
            return new Product(unit.divide(other.unit), angles - other.angles);
        }

        Product power(int n) {
            return n == 1 ? this : new Product(unit.pow(n), angles * n);
        }
    }

    private UnitReader(String text) {
        this.text = text;
    }

    /**
     * How numbers in a unit become SI.
     *
     * @param spelling the unit as written in a file
     * @param quantity what the numbers are
     * @return the conversion
     * @throws UnitException where the spelling is not understood, or belongs to another quantity
     */
    public static ToSi read(String spelling, Quantity quantity) throws UnitException {
        String trimmed = spelling.trim();
        String lower = trimmed.toLowerCase(Locale.ROOT);
        if (quantity == Quantity.PRESSURE && lower.matches("(m?bar|psi|k?pa)[ (]*g[)]?")) {
            throw new UnitException("\"" + spelling + "\" is a gauge pressure, not an absolute one");
        }
        Product product;
        try {
            product = new UnitReader(trimmed).whole();
        } catch (MeasurementParseException | IllegalArgumentException | UnsupportedOperationException e) {
            throw new UnitException("\"" + spelling + "\" is no unit that is understood");
        }
        Product wanted = new Product(quantity.unit(), angles(quantity));
        if (!product.unit.getDimension().equals(wanted.unit.getDimension()) || product.angles != wanted.angles) {
            throw new UnitException("\"" + spelling + "\" is no unit of " + quantity.words());
        }
        try {
            return conversion(product.unit.getConverterToAny(wanted.unit));
        } catch (IncommensurableException | UnsupportedOperationException e) {
            throw new UnitException("\"" + spelling + "\" is no unit of " + quantity.words());
        }
    }

    private static int angles(Quantity quantity) {
        return quantity == Quantity.ANGLE || quantity == Quantity.ROTATION_RATE ? 1 : 0;
    }

    private static ToSi conversion(UnitConverter converter) {
        if (!converter.isLinear()) {
            return converter::convert; // with a shifted zero, such as °C
        }
        double factor = converter.convert(1.0);
        if (factor == 1) {
            return value -> value;
        }
        double inverse = Math.rint(1 / factor);
        // Dividing by a whole number rounds once; multiplying by its inverse would round twice.
        if (inverse > 1 && Math.abs(factor * inverse - 1) < WHOLE_TOLERANCE) {
            return value -> value / inverse;
        }
        return value -> value * factor;
    }

    private static Map<String, Product> everyday() {
        Unit<?> bar = Units.PASCAL.multiply(100_000);
        Unit<?> micrometre = Units.METRE.divide(1_000_000);
        Map<String, Unit<?>> names = new HashMap<>();
        names.put("um", micrometre);
        names.put("micron", micrometre);
        names.put("bar", bar);
        names.put("mbar", bar.divide(1000));
        names.put("atm", Units.PASCAL.multiply(101_325));
        names.put("min", Units.MINUTE);
        names.put("hr", Units.HOUR);
        names.put("deg", NonSI.DEGREE_ANGLE);
        names.put("degree", NonSI.DEGREE_ANGLE);
        names.put("degrees", NonSI.DEGREE_ANGLE);
        names.put("°", NonSI.DEGREE_ANGLE);
        names.put("rev", USCustomary.REVOLUTION);
        names.put("degC", Units.CELSIUS);
        names.put("degF", USCustomary.FAHRENHEIT);
        names.put("°F", USCustomary.FAHRENHEIT);
        names.put("in", USCustomary.INCH);
        names.put("ft", USCustomary.FOOT);
        names.put("lb", USCustomary.POUND);
        names.put("lbm", USCustomary.POUND);
        // One pound-force on a square inch: 0.45359237 kg × 9.80665 m/s² / (0.0254 m)², exact by definition.
        names.put("psi", Units.PASCAL.multiply(0.45359237 * 9.80665 / (0.0254 * 0.0254)));
        names.put("psia", names.get("psi"));
        Map<String, Product> products = new HashMap<>();
        names.forEach((name, unit) -> products.put(name, single(unit)));
        products.put("rpm", products.get("rev").over(products.get("min")));
        return products;
    }

    private Product whole() {
        if (text.isEmpty()) {
            return Product.ONE;
        }
        Product product = product();
        if (at < text.length()) {
            throw notUnderstood();
        }
        return product;
    }

    private Product product() {
        Product product = power();
        while (at < text.length() && peek() != ')') {
            if (peekPast() == '/') {
                skipBlanks();
                at++;
                skipBlanks();
                product = product.over(power());
            } else {
                skipTimes();
                product = product.times(power());
            }
        }
        return product;
    }

    private Product power() {
        Product base;
        if (at < text.length() && peek() == '(') {
            at++;
            skipBlanks();
            base = product();
            if (at >= text.length() || peek() != ')') {
                throw notUnderstood();
            }
            at++;
        } else {
            int start = at;
            while (at < text.length() && isSymbol(peek())) {
                at++;
            }
            String symbol = text.substring(start, at);
            if (symbol.isEmpty()) {
                if (at < text.length() && peek() == '1') {
                    at++;
                    return Product.ONE;
                }
                throw notUnderstood();
            }
            base = single(symbol);
        }
        return base.power(exponent());
    }

    private static Product single(String symbol) {
        Product everyday = EVERYDAY.get(symbol);
        if (everyday != null) {
            return everyday;
        }
        synchronized (LIBRARY) {
            return single(LIBRARY.parse(symbol));
        }
    }

    private static Product single(Unit<?> unit) {
        return new Product(unit, Units.RADIAN.equals(unit.getSystemUnit()) ? 1 : 0);
    }

    private int exponent() {
        boolean marked = false;
        if (text.startsWith("**", at)) {
            at += 2;
            marked = true;
        } else if (at < text.length() && peek() == '^') {
            at++;
            marked = true;
        }
        int start = at;
        int sign = 1;
        if (at < text.length() && (peek() == '-' || peek() == '⁻' || peek() == '−' || peek() == '+')) {
            sign = peek() == '+' ? 1 : -1;
            at++;
        }
        int digits = 0;
        int exponent = 0;
        while (at < text.length() && digit(peek()) >= 0 && digits < 3) {
            exponent = 10 * exponent + digit(peek());
            at++;
            digits++;
        }
        if (digits == 0) {
            if (marked || at > start) {
                throw notUnderstood();
            }
            return 1;
        }
        return sign * exponent;
    }

    private static int digit(char c) {
        return c >= '0' && c <= '9' ? c - '0' : SUPERSCRIPTS.indexOf(c);
    }

    private static boolean isSymbol(char c) {
        return Character.isLetter(c) || c == '°' || c == '℃' || c == 'µ' || c == '%' || c == '_';
    }

    private char peek() {
        return text.charAt(at);
    }

    /** The next character that is not blank, or a blank at the end. */
    private char peekPast() {
        int n = at;
        while (n < text.length() && text.charAt(n) == ' ') {
            n++;
        }
        return n < text.length() ? text.charAt(n) : ' ';
    }

    private void skipBlanks() {
        while (at < text.length() && peek() == ' ') {
            at++;
        }
    }

    private void skipTimes() {
        int start = at;
        skipBlanks();
        if (at < text.length() && (peek() == '*' || peek() == '.' || peek() == '·' || peek() == '⋅')) {
            at++;
            skipBlanks();
        }
        if (at == start) {
            throw notUnderstood();
        }
    }

    private IllegalArgumentException notUnderstood() {
        return new IllegalArgumentException(text + " at " + at);
    }
}
