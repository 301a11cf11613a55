package org.whither.samples;

/** How much supply gas enters the film through its face, given the film pressure there. */
interface FeedLaw {
    /**
     * Mass flux into the film.
     *
     * @param pressure absolute film pressure (Pa)
     * @return mass flux (kg/(m² s)); negative where film gas leaves through the feed
     */
    double flux(double pressure);

    /** Derivative of {@link #flux} by the pressure (kg/(m² s Pa)). */
    double slope(double pressure);

    /**
     * A given mass flux.
     *
     * @param massFlux mass flux into the film (kg/(m² s))
     */
    record Given(double massFlux) implements FeedLaw {
        @Override
        public double flux(double pressure) {
            return massFlux;
        }

        @Override
        public double slope(double pressure) {
            return 0;
        }
    }

    /**
     * A porous layer: viscous, isothermal flow of an ideal gas (Darcy's law integrated along the layer), q = K (pₛ² − p²).
     *
     * @param permeance K (kg/(m² s Pa²))
     * @param supply absolute pressure before the layer (Pa)
     */
    record Porous(double permeance, double supply) implements FeedLaw {
        @Override
        public double flux(double pressure) {
            return permeance * (supply - pressure) * (supply + pressure);
        }

        @Override
        public double slope(double pressure) {
            return -2 * permeance * pressure;
        }
    }

    /**
     * Orifices spread evenly over the annulus: isentropic flow of an ideal gas to the throat, choked beyond the critical
     * pressure ratio. Source: A. de Saint-Venant and L. Wantzel, "Mémoire et expériences sur l'écoulement de l'air",
     * J. École Polytech. 16, 1839; any text on gas dynamics. Where the two pressures differ by less than a thousandth the
     * square-root law, whose slope has no bound, gives way to a cubic with the same value and slope at that difference:
     * at so small a difference the flow in a real orifice is laminar.
     *
     * @param supply absolute pressure before the orifices (Pa)
     * @param temperature gas temperature before the orifices (K)
     * @param specificGasConstant specific gas constant (J/(kg K))
     * @param isentropicExponent ratio of specific heats
     * @param effectiveArea discharge coefficient times the orifices' share of the annulus' area
     */
    record Orifice(
            double supply,
            double temperature,
            double specificGasConstant,
            double isentropicExponent,
            double effectiveArea)
            implements FeedLaw {
        private static final double NEARLY_EQUAL = 1e-3;

        /** Pressure ratio at and below which the flow chokes, (2/(γ + 1))^(γ/(γ − 1)). */
        double criticalRatio() {
            double g = isentropicExponent;
            return Math.pow(2 / (g + 1), g / (g - 1));
        }

        @Override
        public double flux(double pressure) {
            double speed = effectiveArea / Math.sqrt(specificGasConstant * temperature);
            return pressure <= supply
                    ? speed * supply * outflow(pressure / supply)
                    : -speed * pressure * outflow(supply / pressure);
        }

        @Override
        public double slope(double pressure) {
            double speed = effectiveArea / Math.sqrt(specificGasConstant * temperature);
            if (pressure <= supply) {
                return speed * outflowSlope(pressure / supply);
            }
            double ratio = supply / pressure;
            return -speed * (outflow(ratio) - ratio * outflowSlope(ratio));
        }

        /** Dimensionless outflow at a pressure ratio of at most 1. */
        private double outflow(double ratio) {
            if (ratio > 1 - NEARLY_EQUAL) {
                double x = (1 - ratio) / NEARLY_EQUAL;
                double end = isentropic(1 - NEARLY_EQUAL);
                double endSlope = -isentropicSlope(1 - NEARLY_EQUAL) * NEARLY_EQUAL;
                // a x + b x³ with value and slope of the isentropic law at x = 1
                double b = 0.5 * (endSlope - end);
                return x * (end - b + b * x * x);
            }
            return isentropic(Math.max(ratio, criticalRatio()));
        }

        private double outflowSlope(double ratio) {
            if (ratio > 1 - NEARLY_EQUAL) {
                double x = (1 - ratio) / NEARLY_EQUAL;
                double end = isentropic(1 - NEARLY_EQUAL);
                double endSlope = -isentropicSlope(1 - NEARLY_EQUAL) * NEARLY_EQUAL;
                double b = 0.5 * (endSlope - end);
                return -(end - b + 3 * b * x * x) / NEARLY_EQUAL;
            }
            return ratio <= criticalRatio() ? 0 : isentropicSlope(ratio);
        }

        private double isentropic(double ratio) {
            double g = isentropicExponent;
            return Math.sqrt(2 * g / (g - 1) * (Math.pow(ratio, 2 / g) - Math.pow(ratio, (g + 1) / g)));
        }

        private double isentropicSlope(double ratio) {
            double g = isentropicExponent;
            double slope = g / (g - 1) * (2 / g * Math.pow(ratio, 2 / g - 1) - (g + 1) / g * Math.pow(ratio, 1 / g));
            return slope / isentropic(ratio);
        }
    }
}
