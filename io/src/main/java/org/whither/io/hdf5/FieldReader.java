package org.whither.io.hdf5;

import static org.whither.io.hdf5.Layout.COMPRESSIBILITY_FACTOR;
import static org.whither.io.hdf5.Layout.CONDITIONS;
import static org.whither.io.hdf5.Layout.CREATED;
import static org.whither.io.hdf5.Layout.DEFAULT_INNER_SIDE;
import static org.whither.io.hdf5.Layout.DEFAULT_OUTER_SIDE;
import static org.whither.io.hdf5.Layout.DENSITY;
import static org.whither.io.hdf5.Layout.FACE;
import static org.whither.io.hdf5.Layout.FIELD;
import static org.whither.io.hdf5.Layout.GAS;
import static org.whither.io.hdf5.Layout.GAS_NAME;
import static org.whither.io.hdf5.Layout.GRID;
import static org.whither.io.hdf5.Layout.INNER_SIDE;
import static org.whither.io.hdf5.Layout.LAYOUT;
import static org.whither.io.hdf5.Layout.LAYOUT_VERSION;
import static org.whither.io.hdf5.Layout.MASK;
import static org.whither.io.hdf5.Layout.MASS_FLOW_R;
import static org.whither.io.hdf5.Layout.MASS_FLOW_THETA;
import static org.whither.io.hdf5.Layout.MASS_FLUX;
import static org.whither.io.hdf5.Layout.MOLAR_MASS;
import static org.whither.io.hdf5.Layout.ORIGIN;
import static org.whither.io.hdf5.Layout.OUTER_SIDE;
import static org.whither.io.hdf5.Layout.PRESSURE;
import static org.whither.io.hdf5.Layout.PRESSURE_INNER;
import static org.whither.io.hdf5.Layout.PRESSURE_OUTER;
import static org.whither.io.hdf5.Layout.PRESSURE_SUPPLY;
import static org.whither.io.hdf5.Layout.RADIUS;
import static org.whither.io.hdf5.Layout.RADIUS_FROM;
import static org.whither.io.hdf5.Layout.RADIUS_TO;
import static org.whither.io.hdf5.Layout.ROTATION_RATE;
import static org.whither.io.hdf5.Layout.ROTOR_Z;
import static org.whither.io.hdf5.Layout.SECTORS;
import static org.whither.io.hdf5.Layout.SIGMA;
import static org.whither.io.hdf5.Layout.STATOR_Z;
import static org.whither.io.hdf5.Layout.STEADY_IN;
import static org.whither.io.hdf5.Layout.SUPPLY;
import static org.whither.io.hdf5.Layout.TEMPERATURE;
import static org.whither.io.hdf5.Layout.THETA;
import static org.whither.io.hdf5.Layout.TITLE;
import static org.whither.io.hdf5.Layout.VELOCITY_FRAME;
import static org.whither.io.hdf5.Layout.VELOCITY_R;
import static org.whither.io.hdf5.Layout.VELOCITY_THETA;
import static org.whither.io.hdf5.Layout.VELOCITY_Z;
import static org.whither.io.hdf5.Layout.VISCOSITY;

import java.math.BigDecimal;
import java.math.MathContext;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.LongSupplier;
import java.util.function.ToLongFunction;
import org.whither.film.Conditions;
import org.whither.film.Face;
import org.whither.film.FieldData;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.FullField;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RingFaces;
import org.whither.film.Supply;
import org.whither.film.Values;
import org.whither.io.file.RefusedInput;
import org.whither.io.units.Quantity;

/** Reads a gas film from a file in the film-field layout, and refuses whatever is not fit to be traced. */
public final class FieldReader {
    /** How far the end of a sector may be from its start, turned by the sector angle, as a share of that angle. */
    static final double SECTOR_TOLERANCE = 1e-6;

    /**
     * How far the face heights of the last node line may be from those of the first, as a share of the film thickness
     * there; and the pressures, as a share of the absolute pressure there. A solver that keeps its nodes by
     * interpolation closes a sector to a few tenths of a percent; a wrong sector count misses by far more.
     */
    static final double SEAM_TOLERANCE = 0.01;

    /** Rounding of heights that were kept in 32 bits, as a share of their distance from z = 0. */
    private static final double SINGLE_ROUNDING = 0x1p-22;

    /** Share of the free heap that the arrays of a file may take. */
    private static final double HEAP_SHARE = 0.9;

    private static final long MAPPED_FROM = 32L << 20;

    private static final double ON_FACE = 1e-9;

    private final HdfSource source;
    private FilmGrid grid;

    private FieldReader(HdfSource source) {
        this.source = source;
    }

    /**
     * Reads a film.
     *
     * @param file the file
     * @return the film, in SI
     * @throws RefusedInput where the file is not one of the layout, is damaged, or holds what no film can be
     */
    public static Film read(Path file) {
        return read(file, FieldReader::freeHeap, MAPPED_FROM);
    }

    /** As {@link #read(Path)}, with the memory that arrays may take at the time (bytes). */
    static Film read(Path file, LongSupplier freeHeap) {
        return read(file, freeHeap, MAPPED_FROM);
    }

    /** The same with the size from which numbers in one piece are left where they lie in the file (bytes). */
    static Film read(Path file, LongSupplier freeHeap, long mappedFrom) {
        try (HdfSource source = HdfSource.open(file, freeHeap, mappedFrom)) {
            return new FieldReader(source).film();
        }
    }

    private static long freeHeap() {
        Runtime runtime = Runtime.getRuntime();
        return (long) (HEAP_SHARE * (runtime.maxMemory() - runtime.totalMemory() + runtime.freeMemory()));
    }

    private Film film() {
        Section root = source.root();
        checkLayout(root);
        Film.Heading heading = new Film.Heading(root.text(TITLE, ""), root.text(ORIGIN, ""), root.text(CREATED, ""));
        Conditions conditions = conditions(root.section(CONDITIONS));
        Gas gas = gas(root.section(GAS));
        Section gridSection = root.section(GRID);
        Section fieldSection = root.section(FIELD);
        grid = grid(gridSection);
        Frame velocityFrame = frame(fieldSection, fieldSection.text(VELOCITY_FRAME), VELOCITY_FRAME);
        Frame steadyIn = frame(fieldSection, fieldSection.text(STEADY_IN, "rotating"), STEADY_IN);
        boolean full = fieldSection.has(VELOCITY_R) || fieldSection.has(VELOCITY_THETA) || fieldSection.has(VELOCITY_Z);
        StoredArray pressure = fieldSection.array(PRESSURE, Quantity.PRESSURE);
        Location pressureAt = full ? Location.NODE : location(pressure);
        RingFaces faces = faces(gridSection, pressureAt, full);
        FieldData field = full
                ? fullField(gridSection, fieldSection, pressure)
                : lubricationField(fieldSection, pressure, pressureAt);
        Optional<Supply> supply = root.has(SUPPLY) ? Optional.of(supply(root.section(SUPPLY))) : Optional.empty();
        return new Film(heading, conditions, gas, grid, faces, velocityFrame, steadyIn, field, supply);
    }

    private void checkLayout(Section root) {
        if (!root.bears(LAYOUT)) {
            throw source.refuse(
                    "this HDF5 file has no root attribute layout",
                    "the layout film-field",
                    "name a file in that layout, or bring this one into it first");
        }
        String layout = root.text(LAYOUT);
        if (!layout.equals(Layout.NAME)) {
            throw source.refuse(
                    "attribute /@layout is \"" + layout + "\"",
                    "\"" + Layout.NAME + "\"",
                    "name a file in that layout, or bring this one into it first");
        }
        int version = root.whole(LAYOUT_VERSION, 1, "the version of the layout");
        if (version != Layout.VERSION) {
            throw source.refuse(
                    "attribute /@layout_version is " + version,
                    "version " + Layout.VERSION,
                    "write the file in that version, or use a later release of this program");
        }
    }

    private Conditions conditions(Section section) {
        return new Conditions(
                section.number(ROTATION_RATE, "rad/s"),
                section.positive(PRESSURE_INNER, "an absolute pressure", "Pa"),
                section.positive(PRESSURE_OUTER, "an absolute pressure", "Pa"),
                section.bears(PRESSURE_SUPPLY)
                        ? OptionalDouble.of(section.positive(PRESSURE_SUPPLY, "an absolute pressure", "Pa"))
                        : OptionalDouble.empty(),
                section.positive(TEMPERATURE, "an absolute temperature", "K"),
                section.text(INNER_SIDE, DEFAULT_INNER_SIDE),
                section.text(OUTER_SIDE, DEFAULT_OUTER_SIDE));
    }

    private Gas gas(Section section) {
        return new Gas(
                section.text(GAS_NAME),
                section.positive(MOLAR_MASS, "a molar mass", "kg/mol"),
                section.positive(VISCOSITY, "a viscosity", "Pa·s"),
                section.bears(COMPRESSIBILITY_FACTOR)
                        ? section.positive(COMPRESSIBILITY_FACTOR, "a compressibility factor", "1")
                        : 1);
    }

    private Frame frame(Section section, String word, String attribute) {
        for (Frame frame : Frame.values()) {
            if (word.equals(frame.name().toLowerCase(Locale.ROOT))) {
                return frame;
            }
        }
        throw source.refuse(
                "attribute " + section.place(attribute) + " is \"" + word + "\"",
                "\"rotating\" or \"stationary\"",
                "write the frame of the observer who measured it");
    }

    private FilmGrid grid(Section section) {
        int sectors = section.whole(SECTORS, 1, "the number of sectors in the ring");
        double[] radius = radii(section.array(RADIUS, Quantity.LENGTH));
        int nj = radius.length;
        StoredArray theta = section.array(THETA, Quantity.ANGLE);
        if (theta.rank() < 1
                || theta.rank() > 2
                || theta.length(0) < 2
                || (theta.rank() == 2 && theta.length(1) != nj)) {
            throw source.refuse(
                    "dataset " + theta.path() + " is " + theta.shapeText(),
                    "ni angles, or ni × " + nj + " of them for the " + nj + " radii, with ni at least 2",
                    "write one angle for each node line, or for each node");
        }
        requireHeap(List.of(theta));
        double[] given = theta.values();
        double[] angles = theta.rank() == 2 ? given : expanded(given, nj);
        checkAngles(theta, given, 2 * Math.PI / sectors, sectors);
        return new FilmGrid(radius, angles, sectors);
    }

    private double[] radii(StoredArray stored) {
        if (stored.rank() != 1 || stored.length(0) < 2) {
            throw source.refuse(
                    "dataset " + stored.path() + " is " + stored.shapeText(),
                    "a list of at least 2 radii",
                    "write one radius for each ring of nodes");
        }
        requireHeap(List.of(stored));
        double[] radius = stored.values();
        for (int j = 0; j < radius.length; j++) {
            if (!(radius[j] > 0)) {
                throw stored.refuse(j, radius[j], "a radius above 0 m", "give radii from the shaft axis");
            }
            if (j > 0 && !(radius[j] > radius[j - 1])) {
                throw stored.refuse(
                        j,
                        radius[j],
                        "more than the " + radius[j - 1] + " m before it",
                        "write the rings from the inner to the outer diameter, and all fields in that order");
            }
        }
        return radius;
    }

    private static double[] expanded(double[] lines, int nj) {
        double[] angles = new double[lines.length * nj];
        for (int n = 0; n < angles.length; n++) {
            angles[n] = lines[n / nj];
        }
        return angles;
    }

    private static void checkAngles(StoredArray stored, double[] theta, double pitch, int sectors) {
        int width = theta.length / stored.length(0);
        for (int n = width; n < theta.length; n++) {
            if (!(theta[n] > theta[n - width])) {
                throw stored.refuse(
                        n,
                        theta[n],
                        "more than the " + theta[n - width] + " rad before it along the circumference",
                        "write the node lines in the order of rising angle, without a jump at ±180°");
            }
        }
        for (int j = 0; j < width; j++) {
            int last = theta.length - width + j;
            double end = theta[j] + pitch;
            if (!(Math.abs(theta[last] - end) <= SECTOR_TOLERANCE * pitch)) {
                throw stored.refuse(
                        last,
                        theta[last],
                        end + " rad within " + SECTOR_TOLERANCE * pitch + " rad, the first node line turned by one of "
                                + sectors + " sectors",
                        "write both the first and the last node line of the sector, or mend /grid@sectors");
            }
        }
    }

    private Location location(StoredArray stored) {
        if (stored.hasShape(grid.ni(), grid.nj())) {
            return Location.NODE;
        }
        if (stored.hasShape(grid.cellsTheta(), grid.cellsRadial())) {
            return Location.CELL;
        }
        throw source.refuse(
                "dataset " + stored.path() + " is " + stored.shapeText(),
                nodeShape() + " at the nodes or " + cellShape() + " at the cell centres, from the sizes of "
                        + "/grid/theta and /grid/radius",
                "write it with the index order circumferential, radial; without velocities it does not vary across the"
                        + " film");
    }

    private String nodeShape() {
        return StoredArray.shapeText(grid.ni(), grid.nj());
    }

    private String cellShape() {
        return StoredArray.shapeText(grid.cellsTheta(), grid.cellsRadial());
    }

    private RingFaces faces(Section section, Location pressureAt, boolean full) {
        StoredArray rotor = section.array(ROTOR_Z, Quantity.LENGTH);
        StoredArray stator = section.array(STATOR_Z, Quantity.LENGTH);
        Location at = faceLocation(rotor, pressureAt, full);
        if (faceLocation(stator, pressureAt, full) != at) {
            throw source.refuse(
                    "dataset " + stator.path() + " is " + stator.shapeText() + " and " + rotor.path() + " "
                            + rotor.shapeText(),
                    "the same shape for both",
                    "give both faces at the nodes or both at the cell centres");
        }
        requireHeap(List.of(rotor, stator));
        double[] rotorZ = rotor.values();
        double[] statorZ = stator.values();
        for (int n = 0; n < rotorZ.length; n++) {
            if (!(statorZ[n] > rotorZ[n])) {
                throw stator.refuse(
                        n,
                        statorZ[n],
                        "more than the " + rotorZ[n]
                                + " m of the rotor face there, so that the film thickness is above 0",
                        "let z run from the rotor face to the stator face, in numbers fine enough for the film");
            }
        }
        if (at == Location.NODE) {
            checkSeam(rotor, rotorZ, rotorZ, statorZ);
            checkSeam(stator, statorZ, rotorZ, statorZ);
        }
        return new RingFaces(at, rotorZ, statorZ);
    }

    private Location faceLocation(StoredArray stored, Location pressureAt, boolean full) {
        Location at = location(stored);
        if (at == Location.CELL && pressureAt == Location.NODE) {
            throw source.refuse(
                    "dataset " + stored.path() + " is " + stored.shapeText() + ", at the cell centres",
                    nodeShape() + ", at the nodes, as the pressure is",
                    full
                            ? "give the faces of a full field at its nodes"
                            : "give both at the nodes or both at the cells");
        }
        return at;
    }

    /** Face heights of the last node line against those of the first. */
    private void checkSeam(StoredArray stored, double[] z, double[] rotorZ, double[] statorZ) {
        for (int j = 0; j < grid.nj(); j++) {
            int last = grid.node(grid.ni() - 1, j);
            double tolerance = SEAM_TOLERANCE * (statorZ[j] - rotorZ[j])
                    + SINGLE_ROUNDING * Math.max(Math.abs(z[j]), Math.abs(z[last]));
            if (!(Math.abs(z[last] - z[j]) <= tolerance)) {
                throw stored.refuse(
                        last,
                        z[last],
                        z[j] + " m within " + tolerance + " m, as on the first node line of the sector",
                        "write the same geometry on both ends of the sector, or mend /grid@sectors");
            }
        }
    }

    private void checkPressure(StoredArray stored, Values pressure, int levels) {
        checkPositive(stored, pressure, "an absolute pressure above 0 Pa", "add the ambient pressure to gauge values");
        if (pressure.size() != grid.nodes() * levels) {
            return; // at the cells, where no value lies on the seam
        }
        for (int n = 0; n < grid.nj() * levels; n++) {
            int last = (grid.ni() - 1) * grid.nj() * levels + n;
            double begin = pressure.at(n);
            double end = pressure.at(last);
            if (!(Math.abs(end - begin) <= SEAM_TOLERANCE * begin)) {
                throw stored.refuse(
                        last,
                        end,
                        begin + " Pa within " + 100 * SEAM_TOLERANCE + " %, as on the first node line of the sector",
                        "write the same pressure on both ends of the sector, or mend /grid@sectors");
            }
        }
    }

    private static void checkPositive(StoredArray stored, Values values, String expected, String mend) {
        int bad = StoredArray.firstNotPositive(values);
        if (bad >= 0) {
            throw stored.refuse(bad, values.at(bad), expected, mend);
        }
    }

    private LubricationField lubricationField(Section section, StoredArray pressure, Location at) {
        boolean flows = section.has(MASS_FLOW_THETA) || section.has(MASS_FLOW_R);
        List<StoredArray> arrays = new ArrayList<>(List.of(pressure));
        if (flows) {
            String words = "one value for each cell face";
            arrays.add(
                    section.array(MASS_FLOW_THETA, Quantity.MASS_FLOW).withShape(words, grid.ni(), grid.cellsRadial()));
            arrays.add(section.array(MASS_FLOW_R, Quantity.MASS_FLOW).withShape(words, grid.cellsTheta(), grid.nj()));
        }
        requireHeap(arrays);
        double[] values = pressure.values();
        checkPressure(pressure, Values.of(values), 1);
        MassFlows massFlows =
                flows ? new MassFlows(arrays.get(1).values(), arrays.get(2).values()) : null;
        return new LubricationField(at, values, massFlows);
    }

    private FullField fullField(Section gridSection, Section section, StoredArray pressure) {
        double[] sigma = levels(gridSection.array(SIGMA, Quantity.NUMBER));
        int ni = grid.ni();
        int nj = grid.nj();
        int nk = sigma.length;
        String words = "from the sizes of /grid/theta, /grid/radius and /grid/sigma";
        boolean constantAcross = pressure.hasShape(ni, nj);
        if (!constantAcross) {
            pressure.withShape(words + ", or " + nodeShape() + " where it does not vary across the film", ni, nj, nk);
        }
        StoredArray velocityR = section.array(VELOCITY_R, Quantity.VELOCITY).withShape(words, ni, nj, nk);
        StoredArray velocityTheta =
                section.array(VELOCITY_THETA, Quantity.VELOCITY).withShape(words, ni, nj, nk);
        StoredArray velocityZ = section.array(VELOCITY_Z, Quantity.VELOCITY).withShape(words, ni, nj, nk);
        List<StoredArray> arrays = new ArrayList<>(List.of(pressure, velocityR, velocityTheta, velocityZ));
        StoredArray density = null;
        if (section.has(DENSITY)) {
            density = section.array(DENSITY, Quantity.DENSITY).withShape(words, ni, nj, nk);
            arrays.add(density);
        }
        StoredArray temperature = null;
        if (section.has(TEMPERATURE)) {
            temperature = section.array(TEMPERATURE, Quantity.TEMPERATURE).withShape(words, ni, nj, nk);
            arrays.add(temperature);
        }
        requireHeap(arrays, StoredArray::heapOfNumbers);
        Values pressures = pressure.numbers();
        checkPressure(pressure, pressures, constantAcross ? 1 : nk);
        return new FullField(
                sigma,
                pressures,
                velocityR.numbers(),
                velocityTheta.numbers(),
                velocityZ.numbers(),
                density == null ? null : positive(density, "a density above 0 kg/m^3"),
                temperature == null ? null : positive(temperature, "an absolute temperature above 0 K"));
    }

    private double[] levels(StoredArray stored) {
        if (stored.rank() != 1 || stored.length(0) < 2) {
            throw source.refuse(
                    "dataset " + stored.path() + " is " + stored.shapeText(),
                    "a list of at least 2 levels, from 0 to 1",
                    "write one level for each index across the film");
        }
        requireHeap(List.of(stored));
        double[] sigma = stored.values();
        int last = sigma.length - 1;
        for (int k = 0; k <= last; k++) {
            if (k > 0 && !(sigma[k] > sigma[k - 1])) {
                throw stored.refuse(
                        k,
                        sigma[k],
                        "more than the " + sigma[k - 1] + " before it",
                        "write the levels from the rotor face to the stator face");
            }
            double end = k == 0 ? 0 : 1;
            if ((k == 0 || k == last) && sigma[k] != end) {
                throw stored.refuse(
                        k,
                        sigma[k],
                        "levels that run from exactly 0 at the rotor face to exactly 1 at the stator face",
                        "write them as fractions of the local film thickness, both faces included");
            }
        }
        return sigma;
    }

    private static Values positive(StoredArray stored, String expected) {
        Values values = stored.numbers();
        checkPositive(stored, values, expected, "write absolute values in the unit that units names");
        return values;
    }

    private Supply supply(Section section) {
        Face face = face(section);
        String words = "one value for each cell";
        int rows = grid.cellsTheta();
        int columns = grid.cellsRadial();
        double[] massFlux = null;
        if (section.has(MASS_FLUX)) {
            StoredArray stored = section.array(MASS_FLUX, Quantity.MASS_FLUX).withShape(words, rows, columns);
            requireHeap(List.of(stored));
            massFlux = stored.values();
        }
        boolean annulus = section.bears(RADIUS_FROM) || section.bears(RADIUS_TO);
        if (annulus && section.has(MASK)) {
            throw source.refuse(
                    "the group /supply has both radius_from or radius_to and a mask",
                    "one of the two",
                    "remove the one that does not describe the feed");
        }
        if (annulus) {
            return Supply.ofAnnulus(grid, face, annulus(section), massFlux);
        }
        StoredArray mask = section.array(MASK, Quantity.NUMBER).withShape(words, rows, columns);
        return Supply.ofCells(face, cells(mask), massFlux);
    }

    private Face face(Section section) {
        String word = section.text(FACE, "stator");
        for (Face face : Face.values()) {
            if (word.equals(face.name().toLowerCase(Locale.ROOT))) {
                return face;
            }
        }
        throw source.refuse(
                "attribute " + section.place(FACE) + " is \"" + word + "\"",
                "\"stator\" or \"rotor\"",
                "name the face that the supply gas comes through");
    }

    private Supply.Annulus annulus(Section section) {
        double from = section.number(RADIUS_FROM, "m");
        double to = section.number(RADIUS_TO, "m");
        if (!(to > from)) {
            throw source.refuse(
                    "attribute " + section.place(RADIUS_TO) + " is " + to + " m",
                    "more than the " + from + " m of radius_from",
                    "write the inner radius of the feed as radius_from and the outer one as radius_to");
        }
        double slack = ON_FACE * grid.outerRadius();
        for (String name : List.of(RADIUS_FROM, RADIUS_TO)) {
            double radius = name.equals(RADIUS_FROM) ? from : to;
            if (radius < grid.innerRadius() - slack || radius > grid.outerRadius() + slack) {
                throw source.refuse(
                        "attribute " + section.place(name) + " is " + radius + " m, off the face",
                        "a radius between " + rounded(grid.innerRadius()) + " m and " + rounded(grid.outerRadius())
                                + " m, the ends of /grid/radius",
                        "give the feed's radii in metres");
            }
        }
        return new Supply.Annulus(from, to);
    }

    private static double rounded(double value) {
        return new BigDecimal(value).round(new MathContext(10)).doubleValue();
    }

    private boolean[] cells(StoredArray mask) {
        requireHeap(List.of(mask));
        double[] values = mask.values();
        boolean[] cells = new boolean[values.length];
        for (int n = 0; n < values.length; n++) {
            if (values[n] != 0 && values[n] != 1) {
                throw mask.refuse(n, values[n], "1 for a feed cell and 0 for any other", "write only these two");
            }
            cells[n] = values[n] == 1;
        }
        return cells;
    }

    /** Refuses arrays that the heap cannot take, saying how large it would have to be. */
    private void requireHeap(List<StoredArray> arrays) {
        requireHeap(arrays, StoredArray::heap);
    }

    private void requireHeap(List<StoredArray> arrays, ToLongFunction<StoredArray> heap) {
        long kept = 0;
        long whileRead = 0;
        for (StoredArray array : arrays) {
            kept += heap.applyAsLong(array);
            whileRead = Math.max(whileRead, array.heapWhileRead());
        }
        long free = source.freeHeap(kept + whileRead);
        if (kept + whileRead <= free) {
            return;
        }
        Runtime runtime = Runtime.getRuntime();
        long used = runtime.totalMemory() - runtime.freeMemory();
        long quarters = (long) Math.ceil((used + (kept + whileRead) / HEAP_SHARE) / 0x1p28);
        long megabytes = 256 * quarters;
        throw source.refuse(
                "the numbers of " + arrays.get(0).path() + (arrays.size() > 1 ? " and its companions" : "") + " take "
                        + ((kept + whileRead + (1 << 20) - 1) >> 20) + " MiB of memory",
                "at most the " + (free >> 20) + " MiB that are free in the program's heap",
                "set WHITHER_JAVA_OPTS=-Xmx" + megabytes + "m where the machine has that much, or use a coarser grid");
    }
}
