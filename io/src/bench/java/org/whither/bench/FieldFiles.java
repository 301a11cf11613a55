package org.whither.bench;

import io.jhdf.HdfFile;
import io.jhdf.WritableHdfFile;
import io.jhdf.api.WritableDataset;
import io.jhdf.api.WritableGroup;
import java.nio.file.Path;
import java.util.function.IntToDoubleFunction;
import java.util.stream.IntStream;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.FullField;

/** Field files of any size for benchmarks, in 32- or 64-bit numbers in one piece. */
final class FieldFiles {
    private FieldFiles() {}

    /**
     * Writes a full field, its nodes made denser by interpolation along the grid.
     *
     * @param film a full film whose pressure and velocities are to be written
     * @param around how many cells each cell becomes along θ
     * @param out how many along r
     * @param singles whether the field is written in 32 bits
     * @param file where to
     * @return bytes of the pressure and the velocities
     */
    static long write(Film film, int around, int out, boolean singles, Path file) {
        Dense dense = new Dense(film.grid(), around, out);
        FullField field = (FullField) film.field();
        int nk = field.nk();
        try (WritableHdfFile hdf = HdfFile.write(file)) {
            hdf.putAttribute("layout", "film-field");
            hdf.putAttribute("layout_version", 1);
            hdf.putAttribute("title", "Demo seal for benchmarks");
            WritableGroup conditions = hdf.putGroup("conditions");
            conditions.putAttribute("rotation_rate", film.conditions().rotationRate());
            conditions.putAttribute("pressure_inner", film.conditions().pressureInner());
            conditions.putAttribute("pressure_outer", film.conditions().pressureOuter());
            conditions.putAttribute("temperature", film.conditions().temperature());
            WritableGroup gas = hdf.putGroup("gas");
            gas.putAttribute("name", film.gas().name());
            gas.putAttribute("molar_mass", film.gas().molarMass());
            gas.putAttribute("viscosity", film.gas().viscosity());
            // Not last: the library (jHDF 0.11.0) writes over a last group that has no dataset.
            WritableGroup supply = hdf.putGroup("supply");
            supply.putAttribute(
                    "radius_from",
                    film.supply().orElseThrow().annulus().orElseThrow().from());
            supply.putAttribute(
                    "radius_to",
                    film.supply().orElseThrow().annulus().orElseThrow().to());
            WritableGroup grid = hdf.putGroup("grid");
            grid.putAttribute("sectors", film.grid().sectors());
            double[] radius = new double[dense.nj];
            for (int j = 0; j < radius.length; j++) {
                radius[j] = dense.radius(j);
            }
            double[] sigma = new double[nk];
            for (int k = 0; k < nk; k++) {
                sigma[k] = field.sigma(k);
            }
            put(grid, "radius", radius, "m");
            put(grid, "sigma", sigma, "1");
            FilmGrid coarse = film.grid();
            put(grid, "theta", dense.plane(n -> coarse.theta(n / coarse.nj(), n % coarse.nj())), "rad");
            put(grid, "rotor_z", dense.plane(film.faces()::rotorZ), "m");
            put(grid, "stator_z", dense.plane(film.faces()::statorZ), "m");
            WritableGroup values = hdf.putGroup("field");
            values.putAttribute("velocity_frame", "rotating");
            put(values, "pressure", dense.space(nk, singles, n -> field.pressure(n / nk, n % nk)), "Pa");
            put(values, "velocity_r", dense.space(nk, singles, n -> field.velocityR(n / nk, n % nk)), "m/s");
            put(values, "velocity_theta", dense.space(nk, singles, n -> field.velocityTheta(n / nk, n % nk)), "m/s");
            put(values, "velocity_z", dense.space(nk, singles, n -> field.velocityZ(n / nk, n % nk)), "m/s");
        }
        return 4L * dense.ni * dense.nj * nk * (singles ? Float.BYTES : Double.BYTES);
    }

    private static void put(WritableGroup group, String name, Object data, String units) {
        WritableDataset dataset = group.putDataset(name, data);
        dataset.putAttribute("units", units);
    }

    /** A grid with more nodes. */
    private static final class Dense {
        private final FilmGrid grid;
        private final int around;
        private final int out;
        private final int ni;
        private final int nj;

        Dense(FilmGrid grid, int around, int out) {
            this.grid = grid;
            this.around = around;
            this.out = out;
            ni = grid.cellsTheta() * around + 1;
            nj = grid.cellsRadial() * out + 1;
        }

        double radius(int j) {
            int cell = Math.min(grid.cellsRadial() - 1, j / out);
            double b = (double) (j - cell * out) / out;
            return (1 - b) * grid.radius(cell) + b * grid.radius(cell + 1);
        }

        private double at(int i, int j, int k, int nk, IntToDoubleFunction value) {
            int ci = Math.min(grid.cellsTheta() - 1, i / around);
            int cj = Math.min(grid.cellsRadial() - 1, j / out);
            double a = (double) (i - ci * around) / around;
            double b = (double) (j - cj * out) / out;
            int n = grid.node(ci, cj) * nk + k;
            int m = grid.node(ci + 1, cj) * nk + k;
            return (1 - a) * ((1 - b) * value.applyAsDouble(n) + b * value.applyAsDouble(n + nk))
                    + a * ((1 - b) * value.applyAsDouble(m) + b * value.applyAsDouble(m + nk));
        }

        double[][] plane(IntToDoubleFunction value) {
            double[][] all = new double[ni][nj];
            for (int i = 0; i < ni; i++) {
                for (int j = 0; j < nj; j++) {
                    all[i][j] = at(i, j, 0, 1, value);
                }
            }
            return all;
        }

        Object space(int nk, boolean singles, IntToDoubleFunction value) {
            float[][][] small = singles ? new float[ni][nj][nk] : null;
            double[][][] large = singles ? null : new double[ni][nj][nk];
            IntStream.range(0, ni).parallel().forEach(i -> {
                for (int j = 0; j < nj; j++) {
                    for (int k = 0; k < nk; k++) {
                        double v = at(i, j, k, nk, value);
                        if (singles) {
                            small[i][j][k] = (float) v;
                        } else {
                            large[i][j][k] = v;
                        }
                    }
                }
            });
            return singles ? small : large;
        }
    }
}
