package org.whither.io.hdf5;

import io.jhdf.api.Attribute;
import io.jhdf.api.Dataset;
import io.jhdf.api.Group;
import io.jhdf.api.Node;
import java.lang.reflect.Array;
import java.util.Map;
import org.whither.io.file.RefusedInput;
import org.whither.io.units.Quantity;

/** A group of the file, with its attributes and datasets; what is missing or of another kind is refused by name. */
final class Section {
    private final HdfSource source;
    private final Group group;
    private final String path;
    private final Map<String, Attribute> attributes;

    /**
     * A group.
     *
     * @param source the file
     * @param group the library's group
     * @param path its path, ending in a stroke
     */
    Section(HdfSource source, Group group, String path) {
        this.source = source;
        this.group = group;
        this.path = path;
        this.attributes = source.guarded("the attributes of " + path, group::getAttributes);
    }

    /** Whether the group holds an object of that name. */
    boolean has(String name) {
        return source.find(group, path, name) != null;
    }

    /** Whether the group bears an attribute of that name. */
    boolean bears(String attribute) {
        return attributes.containsKey(attribute);
    }

    /** A group within this one; refused where it is missing. */
    Section section(String name) {
        Node node = source.find(group, path, name);
        if (!(node instanceof Group found)) {
            throw source.refuse(
                    "the group " + path + name + (node == null ? " is missing" : " is no group"),
                    "a group of that name",
                    "add it as the layout film-field describes");
        }
        return new Section(source, found, path + name + "/");
    }

    /** A dataset of this group; refused where it is missing or its unit is not one of the quantity. */
    StoredArray array(String name, Quantity quantity) {
        Node node = source.find(group, path, name);
        if (!(node instanceof Dataset found)) {
            throw source.refuse(
                    "the dataset " + path + name + (node == null ? " is missing" : " is no dataset"),
                    "a dataset of that name, in " + quantity.siSpelling(),
                    "write it as the layout film-field describes");
        }
        return StoredArray.of(source, found, path + name, quantity);
    }

    /**
     * A text.
     *
     * @param name the attribute
     * @return its text, without blanks around it
     */
    String text(String name) {
        String text = readText(source, attributes, place(name), name);
        if (text == null) {
            throw missing(name, "a text");
        }
        return text;
    }

    /** A text, or another one where the attribute is missing. */
    String text(String name, String otherwise) {
        return bears(name) ? text(name) : otherwise;
    }

    /** A finite number; refused where it is missing. */
    double number(String name, String unit) {
        Object value = bears(name) ? single(source, attributes.get(name), place(name)) : null;
        if (value == null && !bears(name)) {
            throw missing(name, "a number in " + unit);
        }
        if (!(value instanceof Number given)) {
            throw source.refuse(
                    "attribute " + place(name) + " is " + said(value),
                    "one number in " + unit,
                    "write it as a scalar number");
        }
        double number = given.doubleValue();
        if (!Double.isFinite(number)) {
            throw source.refuse(
                    "attribute " + place(name) + " is " + number,
                    "a finite number in " + unit,
                    "write the value that the field was computed with");
        }
        return number;
    }

    /** A number above zero; refused where it is missing or not so. */
    double positive(String name, String words, String unit) {
        double number = number(name, unit);
        if (!(number > 0)) {
            throw source.refuse(
                    "attribute " + place(name) + " is " + number + " " + unit,
                    words + " above 0 " + unit,
                    "write the value that the field was computed with, in " + unit);
        }
        return number;
    }

    /** A whole number; refused where it is missing, not whole, or less than the least. */
    int whole(String name, int least, String words) {
        double number = number(name, "whole numbers");
        if (number != Math.rint(number) || number < least || number > Integer.MAX_VALUE) {
            throw source.refuse(
                    "attribute " + place(name) + " is " + number,
                    words + ", a whole number of at least " + least,
                    "write that number as an integer");
        }
        return (int) number;
    }

    /** Path of an attribute as it is told to the user. */
    String place(String attribute) {
        return (path.length() > 1 ? path.substring(0, path.length() - 1) : path) + "@" + attribute;
    }

    /** A refusal of the file. */
    RefusedInput refuse(String found, String expected, String mend) {
        return source.refuse(found, expected, mend);
    }

    private RefusedInput missing(String name, String kind) {
        return source.refuse(
                "attribute " + place(name) + " is missing",
                "the attribute " + name + ", " + kind,
                "add it as the layout film-field describes");
    }

    /**
     * The text of an attribute, or null where there is none.
     *
     * @throws RefusedInput where it is no single text
     */
    static String readText(HdfSource source, Map<String, Attribute> attributes, String place, String name) {
        Attribute attribute = attributes.get(name);
        if (attribute == null) {
            return null;
        }
        Object value = single(source, attribute, place);
        if (!(value instanceof String text)) {
            throw source.refuse("attribute " + place + " is " + said(value), "one text", "write it as a scalar string");
        }
        return text.trim();
    }

    /** The value of an attribute that holds one; its array where it holds more; null where it holds none. */
    private static Object single(HdfSource source, Attribute attribute, String place) {
        return source.guarded("attribute " + place, () -> {
            Object value = attribute.getData();
            while (value != null && value.getClass().isArray() && Array.getLength(value) == 1) {
                value = Array.get(value, 0);
            }
            return value;
        });
    }

    private static String said(Object value) {
        if (value == null) {
            return "empty";
        }
        if (value instanceof String) {
            return "the text \"" + value + "\"";
        }
        if (value instanceof Number) {
            return "the number " + value;
        }
        return value.getClass().isArray() ? "an array of " + Array.getLength(value) : "of another kind";
    }
}
