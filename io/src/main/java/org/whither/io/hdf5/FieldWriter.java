package org.whither.io.hdf5;

import io.jhdf.Superblock;
import io.jhdf.WritableGroupImpl;
import io.jhdf.api.WritableGroup;
import io.jhdf.exceptions.HdfException;
import io.jhdf.storage.HdfFileChannel;
import java.io.IOException;
import java.nio.channels.FileChannel;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.util.Locale;
import java.util.function.IntToDoubleFunction;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.FullField;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RingFaces;
import org.whither.film.Supply;
import org.whither.io.file.WholeFile;
import org.whither.io.units.Quantity;

/** Writes a gas film in the film-field layout: SI units, 64-bit numbers, the whole file or none. */
public final class FieldWriter {
    /** The superblock takes 48 bytes. */
    static final long HEAP_ADDRESS = 64;

    private final TextHeap texts;

    private FieldWriter(TextHeap texts) {
        this.texts = texts;
    }

    /**
     * Writes a film.
     *
     * @param film the film
     * @param file the file to write; one that is there is replaced once the new one is whole
     * @throws IOException where writing fails; a file that was there then stays as it was
     */
    public static void write(Film film, Path file) throws IOException {
        WholeFile.write(file, partial -> writeTo(film, partial));
    }

    private static void writeTo(Film film, Path file) throws IOException {
        TextHeap texts = new TextHeap(HEAP_ADDRESS);
        write(new FieldWriter(texts).root(film), texts, file);
    }

    /**
     * Writes a tree of groups and datasets to a new file. The library's own writer of files would add the make of this
     * machine and, where the group written last has no dataset, overwrite that group with it (jHDF 0.11.0,
     * WritableHdfFile.flush); so its parts are used here.
     */
    static void write(WritableGroup root, TextHeap texts, Path file) throws IOException {
        long rootAddress = HEAP_ADDRESS + texts.size();
        Superblock.SuperblockV2V3 superblock = new Superblock.SuperblockV2V3(0, rootAddress);
        try (FileChannel channel = FileChannel.open(
                file, StandardOpenOption.READ, StandardOpenOption.WRITE, StandardOpenOption.CREATE_NEW)) {
            HdfFileChannel target = new HdfFileChannel(channel, superblock);
            long end = root.write(target, rootAddress);
            FlatDataset.put(target, texts.toBuffer(), HEAP_ADDRESS);
            FlatDataset.put(target, superblock.toBuffer(end), 0);
            if (channel.size() != end) {
                throw new IOException(
                        file + " has " + channel.size() + " bytes; expected " + end + "; is the disk full?");
            }
        } catch (HdfException e) {
            throw e.getCause() instanceof IOException ? (IOException) e.getCause() : new IOException(e.getMessage(), e);
        }
    }

    private WritableGroup root(Film film) {
        WritableGroup root = new WritableGroupImpl(null, "/");
        text(root, Layout.LAYOUT, Layout.NAME);
        root.putAttribute(Layout.LAYOUT_VERSION, Layout.VERSION);
        Film.Heading heading = film.heading();
        text(root, Layout.TITLE, heading.title());
        text(root, Layout.ORIGIN, heading.origin());
        text(root, Layout.CREATED, heading.created());
        conditions(root.putGroup(Layout.CONDITIONS), film.conditions());
        gas(root.putGroup(Layout.GAS), film.gas());
        grid(root.putGroup(Layout.GRID), film);
        field(root.putGroup(Layout.FIELD), film);
        if (film.supply().isPresent()) {
            supply(root.putGroup(Layout.SUPPLY), film.grid(), film.supply().get());
        }
        return root;
    }

    private void text(WritableGroup group, String name, String text) {
        if (text != null && !text.isBlank()) {
            texts.put(group, name, text);
        }
    }

    private void conditions(WritableGroup group, Conditions conditions) {
        group.putAttribute(Layout.ROTATION_RATE, conditions.rotationRate());
        group.putAttribute(Layout.PRESSURE_INNER, conditions.pressureInner());
        group.putAttribute(Layout.PRESSURE_OUTER, conditions.pressureOuter());
        if (conditions.pressureSupply().isPresent()) {
            group.putAttribute(
                    Layout.PRESSURE_SUPPLY, conditions.pressureSupply().getAsDouble());
        }
        group.putAttribute(Layout.TEMPERATURE, conditions.temperature());
        text(group, Layout.INNER_SIDE, conditions.innerSide());
        text(group, Layout.OUTER_SIDE, conditions.outerSide());
    }

    private void gas(WritableGroup group, Gas gas) {
        texts.put(group, Layout.GAS_NAME, gas.name());
        group.putAttribute(Layout.MOLAR_MASS, gas.molarMass());
        group.putAttribute(Layout.VISCOSITY, gas.viscosity());
        group.putAttribute(Layout.COMPRESSIBILITY_FACTOR, gas.compressibilityFactor());
    }

    private void grid(WritableGroup group, Film film) {
        FilmGrid grid = film.grid();
        int ni = grid.ni();
        int nj = grid.nj();
        group.putAttribute(Layout.SECTORS, grid.sectors());
        put(group, Layout.RADIUS, Quantity.LENGTH, grid::radius, nj);
        if (radialLines(grid)) {
            put(group, Layout.THETA, Quantity.ANGLE, i -> grid.theta(i, 0), ni);
        } else {
            put(group, Layout.THETA, Quantity.ANGLE, n -> grid.theta(n / nj, n % nj), ni, nj);
        }
        RingFaces faces = film.faces();
        boolean cells = faces.at() == Location.CELL;
        int rows = cells ? grid.cellsTheta() : ni;
        int columns = cells ? grid.cellsRadial() : nj;
        put(group, Layout.ROTOR_Z, Quantity.LENGTH, faces::rotorZ, rows, columns);
        put(group, Layout.STATOR_Z, Quantity.LENGTH, faces::statorZ, rows, columns);
        if (film.field() instanceof FullField full) {
            put(group, Layout.SIGMA, Quantity.NUMBER, full::sigma, full.nk());
        }
    }

    private static boolean radialLines(FilmGrid grid) {
        for (int n = 0; n < grid.nodes(); n++) {
            if (grid.theta(n / grid.nj(), n % grid.nj()) != grid.theta(n / grid.nj(), 0)) {
                return false;
            }
        }
        return true;
    }

    private void field(WritableGroup group, Film film) {
        text(group, Layout.VELOCITY_FRAME, film.velocityFrame().name().toLowerCase(Locale.ROOT));
        text(group, Layout.STEADY_IN, film.steadyIn().name().toLowerCase(Locale.ROOT));
        if (film.field() instanceof FullField full) {
            fullField(group, film.grid(), full);
        } else {
            lubricationField(group, film.grid(), (LubricationField) film.field());
        }
    }

    private void fullField(WritableGroup group, FilmGrid grid, FullField field) {
        int ni = grid.ni();
        int nj = grid.nj();
        int nk = field.nk();
        if (field.pressureConstantAcrossFilm()) {
            put(group, Layout.PRESSURE, Quantity.PRESSURE, n -> field.pressure(n, 0), ni, nj);
        } else {
            put(group, Layout.PRESSURE, Quantity.PRESSURE, n -> field.pressure(n / nk, n % nk), ni, nj, nk);
        }
        put(group, Layout.VELOCITY_R, Quantity.VELOCITY, n -> field.velocityR(n / nk, n % nk), ni, nj, nk);
        put(group, Layout.VELOCITY_THETA, Quantity.VELOCITY, n -> field.velocityTheta(n / nk, n % nk), ni, nj, nk);
        put(group, Layout.VELOCITY_Z, Quantity.VELOCITY, n -> field.velocityZ(n / nk, n % nk), ni, nj, nk);
        if (field.hasDensity()) {
            put(group, Layout.DENSITY, Quantity.DENSITY, n -> field.density(n / nk, n % nk, null, 0), ni, nj, nk);
        }
        if (field.hasTemperature()) {
            put(group, Layout.TEMPERATURE, Quantity.TEMPERATURE, n -> field.temperature(n / nk, n % nk), ni, nj, nk);
        }
    }

    private void lubricationField(WritableGroup group, FilmGrid grid, LubricationField field) {
        boolean cells = field.pressureAt() == Location.CELL;
        int rows = cells ? grid.cellsTheta() : grid.ni();
        int columns = cells ? grid.cellsRadial() : grid.nj();
        put(group, Layout.PRESSURE, Quantity.PRESSURE, field::pressure, rows, columns);
        if (field.massFlows().isPresent()) {
            MassFlows flows = field.massFlows().get();
            double[] theta = flows.thetaValues();
            double[] radial = flows.radialValues();
            put(group, Layout.MASS_FLOW_THETA, Quantity.MASS_FLOW, n -> theta[n], grid.ni(), grid.cellsRadial());
            put(group, Layout.MASS_FLOW_R, Quantity.MASS_FLOW, n -> radial[n], grid.cellsTheta(), grid.nj());
        }
    }

    private void supply(WritableGroup group, FilmGrid grid, Supply supply) {
        int rows = grid.cellsTheta();
        int columns = grid.cellsRadial();
        text(group, Layout.FACE, supply.face().name().toLowerCase(Locale.ROOT));
        if (supply.annulus().isPresent()) {
            group.putAttribute(Layout.RADIUS_FROM, supply.annulus().get().from());
            group.putAttribute(Layout.RADIUS_TO, supply.annulus().get().to());
        } else {
            IntToDoubleFunction mask = n -> supply.feeds(n) ? 1 : 0;
            put(group, new FlatDataset(group, Layout.MASK, true, mask, rows, columns), Quantity.NUMBER);
        }
        if (supply.hasMassFlux()) {
            put(group, Layout.MASS_FLUX, Quantity.MASS_FLUX, supply::massFlux, rows, columns);
        }
    }

    private void put(WritableGroup group, String name, Quantity quantity, IntToDoubleFunction values, int... shape) {
        put(group, new FlatDataset(group, name, false, values, shape), quantity);
    }

    private void put(WritableGroup group, FlatDataset dataset, Quantity quantity) {
        texts.put(dataset, Layout.UNITS, quantity.siSpelling());
        group.putDataset(dataset.getName(), dataset);
    }
}
