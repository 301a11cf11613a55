package org.whither.samples;

/** A solved film's figures as a whole. */
final class FactFinder {
    private FactFinder() {}

    /**
     * Figures of a solved film.
     *
     * @param problem the film
     * @param solution its solution
     * @return the figures
     */
    static SolverFacts facts(FilmProblem problem, FilmSolver.Solution solution) {
        SheetGrid grid = problem.grid();
        int nx = grid.nx();
        int nr = grid.nr();
        double innerIn = 0;
        double innerOut = 0;
        double outerIn = 0;
        double outerOut = 0;
        double supplyIn = 0;
        double supplyOut = 0;
        double force = 0;
        double torque = 0;
        int peak = 0;
        double reynolds = 0;
        double knudsen = 0;
        double omega = problem.rotationRate();
        double gas = problem.specificGasConstant() * problem.temperature();
        for (int i = 0; i < nx; i++) {
            double inner = solution.massRadial()[i * (nr + 1)];
            double outer = solution.massRadial()[i * (nr + 1) + nr];
            innerIn += Math.max(0, inner);
            innerOut += Math.max(0, -inner);
            outerIn += Math.max(0, -outer);
            outerOut += Math.max(0, outer);
            int before = i == 0 ? nx - 1 : i - 1;
            int after = i == nx - 1 ? 0 : i + 1;
            for (int j = 0; j < nr; j++) {
                int n = grid.cell(i, j);
                double p = Math.sqrt(solution.s()[n]);
                double h = problem.thickness()[n];
                double r = grid.middleRadius(j);
                double area = problem.feedArea()[n];
                force += p * area;
                // shear at the stator, which is free of steps: µ Ω r/h − (h/2r) ∂p/∂θ
                double rise = facePressure(problem, solution.s(), n, grid.cell(after, j), i, after)
                        - facePressure(problem, solution.s(), n, grid.cell(before, j), i, before);
                torque += area * (problem.viscosity() * omega * r * r / h - 0.5 * h * rise / grid.width(i));
                if (problem.feed()[n] != null) {
                    double flow = problem.feed()[n].flux(p) * area;
                    supplyIn += Math.max(0, flow);
                    supplyOut += Math.max(0, -flow);
                }
                if (solution.s()[n] > solution.s()[peak]) {
                    peak = n;
                }
                reynolds = Math.max(reynolds, p / gas * Math.abs(omega) * h * h / problem.viscosity());
                // mean free path µ √(π Rₛ T/2)/p: kinetic theory, any text on gas films; longest at the edge of the
                // film
                double lowest = j == 0 ? Math.min(p, problem.pressureInner()) : p;
                lowest = j == nr - 1 ? Math.min(lowest, problem.pressureOuter()) : lowest;
                knudsen = Math.max(knudsen, problem.viscosity() * Math.sqrt(Math.PI * gas / 2) / (lowest * h));
            }
        }
        int ring = grid.sectors();
        double in = supplyIn + innerIn + outerIn;
        double out = supplyOut + innerOut + outerOut;
        return new SolverFacts(
                solution.iterations(),
                solution.speedSteps(),
                solution.residual(),
                in == 0 ? 0 : (in - out) / in,
                ring * supplyIn,
                ring * supplyOut,
                ring * innerIn,
                ring * innerOut,
                ring * outerIn,
                ring * outerOut,
                ring * force,
                omega == 0 ? 0 : ring * torque * omega,
                Math.sqrt(solution.s()[peak]),
                grid.middleRadius(peak % nr),
                grid.middleTheta(peak / nr, peak % nr),
                reynolds,
                knudsen,
                0.5 * solution.upwindedHalfFaces() / (nx * nr));
    }

    /** Pressure between two neighbours along θ, weighted by what each lets through, h³ over its width (Pa). */
    private static double facePressure(FilmProblem problem, double[] s, int n, int m, int i, int other) {
        double own = Math.pow(problem.thickness()[n], 3) / problem.grid().width(i);
        double its = Math.pow(problem.thickness()[m], 3) / problem.grid().width(other);
        return Math.sqrt((own * s[n] + its * s[m]) / (own + its));
    }
}
