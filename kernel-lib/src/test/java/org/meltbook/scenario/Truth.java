package org.meltbook.scenario;

import com.google.gson.Gson;
import java.io.IOException;
import java.io.InputStreamReader;
import java.io.Reader;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.List;
import java.util.Objects;

/**
 * What the invented melts really are: the content of {@code truth.json}, in SI units.
 *
 * @param seed      the number from which all noise of the scenario follows
 * @param resin     linear spectrum of the virgin resin at the reference temperature
 * @param nonlinear what large strains do to each mode
 * @param shift     how temperature moves times and moduli
 * @param chalk     the filler
 * @param scission  how breaking chains shorten the times
 * @param noise     how far readings scatter about the truth
 * @param lots      the lots
 */
record Truth(
        long seed,
        Resin resin,
        Nonlinear nonlinear,
        Shift shift,
        Chalk chalk,
        Scission scission,
        Noise noise,
        List<Lot> lots) {

    /**
     * One log-normal peak of a relaxation spectrum.
     *
     * @param strength sum of its moduli in Pa
     * @param centre   median relaxation time in s
     * @param width    standard deviation of ln(time)
     */
    record Peak(double strength, double centre, double width) {
        /** Modulus in Pa of the peak between {@code time·exp(±step/2)}, time in s, by its value at the middle. */
        double modulus(double time, double step) {
            double z = StrictMath.log(time / centre) / width;
            return strength * step / (width * StrictMath.sqrt(2 * StrictMath.PI)) * StrictMath.exp(-z * z / 2);
        }

        /** The peak with its centre and its width multiplied by the given factors. */
        Peak times(double centreFactor, double widthFactor) {
            return new Peak(strength, centre * centreFactor, width * widthFactor);
        }
    }

    /**
     * Three peaks on a grid of {@code modes} relaxation times in s, evenly spaced on a log scale: the segments, which
     * do not feel how long a chain is, the backbone and the branches.
     */
    record Resin(double shortestTime, double longestTime, int modes, Peak segments, Peak backbone, Peak branches) {
        /** The three peaks. */
        List<Peak> peaks() {
            return List.of(segments, backbone, branches);
        }

        /** The same grid and segments with another backbone and other branches. */
        Resin with(Peak otherBackbone, Peak otherBranches) {
            return new Resin(shortestTime, longestTime, modes, segments, otherBackbone, otherBranches);
        }

        /** Modulus in Pa of the given mode, counted from zero. */
        double modulus(int mode) {
            double sum = 0;
            for (Peak peak : peaks()) {
                sum += peak.modulus(time(mode), step());
            }
            return sum;
        }

        /** Distance of neighbouring times in ln(time). */
        double step() {
            return StrictMath.log(longestTime / shortestTime) / (modes - 1);
        }

        /** Relaxation time in s of the given mode, counted from zero. */
        double time(int mode) {
            return shortestTime * StrictMath.exp(mode * step());
        }
    }

    /**
     * Damping exponent n and ratio ψ = −N2/N1 of a mode; both go from a fast to a slow value as the relaxation time
     * passes the turnover time: {@code n(λ) = fast + (slow − fast) λ/(λ + turnover)}.
     */
    record Nonlinear(
            double fastDamping,
            double slowDamping,
            double fastSecondNormal,
            double slowSecondNormal,
            double turnoverTime) {
        /** Damping exponent, no unit, of the mode with {@code time} in s at the reference temperature. */
        double damping(double time) {
            return fastDamping + (slowDamping - fastDamping) * time / (time + turnoverTime);
        }

        /** −N2/N1, no unit, of the mode with {@code time} in s at the reference temperature. */
        double secondNormal(double time) {
            return fastSecondNormal + (slowSecondNormal - fastSecondNormal) * time / (time + turnoverTime);
        }
    }

    /**
     * Arrhenius shift of the times, and moduli in proportion to density times temperature.
     *
     * @param referenceTemperature in K
     * @param activationEnergy     in J/mol
     * @param meltDensity          density of the unfilled melt in kg/m³ at the reference temperature
     * @param densitySlope         its change in kg/(m³ K)
     */
    record Shift(double referenceTemperature, double activationEnergy, double meltDensity, double densitySlope) {
        private static final double GAS_CONSTANT = 8.31446261815324;

        /** Factor on the relaxation times at {@code kelvin}. */
        double time(double kelvin) {
            return StrictMath.exp(activationEnergy / GAS_CONSTANT * (1 / kelvin - 1 / referenceTemperature));
        }

        /** Factor on the moduli at {@code kelvin}. */
        double modulus(double kelvin) {
            double density = meltDensity + densitySlope * (kelvin - referenceTemperature);
            return density * kelvin / (meltDensity * referenceTemperature);
        }

        /** Factor on the rate of a reaction with activation energy {@code energy} in J/mol at {@code kelvin}. */
        double reaction(double energy, double kelvin) {
            return StrictMath.exp(-energy / GAS_CONSTANT * (1 / kelvin - 1 / referenceTemperature));
        }
    }

    /** Density in kg/m³, intrinsic viscosity and maximum packing of the filler. */
    record Chalk(double density, double intrinsicViscosity, double maximumPacking) {
        /** Volume fraction of a mass fraction in a melt of density {@code melt} in kg/m³. */
        double volumeFraction(double massFraction, double melt) {
            double filler = massFraction / density;
            return filler / (filler + (1 - massFraction) / melt);
        }

        /** Factor on the linear moduli at a volume fraction: (1 − φ/φm)^(−[η] φm) of Krieger and Dougherty. */
        double onModuli(double volumeFraction) {
            return StrictMath.pow(1 - volumeFraction / maximumPacking, -intrinsicViscosity * maximumPacking);
        }

        /**
         * How much more than the whole the melt between the grains is strained: the root of (factor on moduli)/(1 − φ),
         * by Chateau, Ovarlez and Trung, J. Rheol. 52 (2008) 489 (memory).
         */
        double onStrain(double volumeFraction) {
            return StrictMath.sqrt(onModuli(volumeFraction) / (1 - volumeFraction));
        }
    }

    /** Times go with molar mass to the power {@code viscosityExponent}; breaking has an activation energy in J/mol. */
    record Scission(double viscosityExponent, double activationEnergy) {}

    /** Standard deviations: a share of the true value and a floor in Pa, added in squares. */
    record Noise(
            double modulusRelative,
            double modulusFloor,
            double stressRelative,
            double stressFloor,
            double firstNormalRelative,
            double firstNormalFloor) {
        /** Standard deviation in Pa of a storage or loss modulus in Pa. */
        double ofModulus(double modulus) {
            return StrictMath.hypot(modulusRelative * modulus, modulusFloor);
        }

        /** Standard deviation in Pa of a shear stress in Pa. */
        double ofStress(double stress) {
            return StrictMath.hypot(stressRelative * stress, stressFloor);
        }

        /** Standard deviation in Pa of a first normal stress difference in Pa. */
        double ofFirstNormal(double difference) {
            return StrictMath.hypot(firstNormalRelative * difference, firstNormalFloor);
        }
    }

    /**
     * What went into a lot of the compound.
     *
     * @param regrind          mass fraction of regrind in the polymer
     * @param molarMassRatio   molar mass of the regrind over that of the virgin resin
     * @param branchWidthRatio width of the regrind's branch peak over that of the virgin resin
     * @param dampingRatio     damping exponents of the regrind over those of the virgin resin
     * @param chalk            mass fraction of chalk in the compound
     * @param scissionRate     bonds broken in the rheometer per initial chain and second at the reference temperature
     * @param plot             what is odd about the lot, for the reader of the truth
     */
    record Lot(
            String name,
            double regrind,
            double molarMassRatio,
            double branchWidthRatio,
            double dampingRatio,
            double chalk,
            double scissionRate,
            String plot) {
        /** What a ratio of regrind to virgin comes to in the mixture, if the logarithms mix with the mass fraction. */
        double mixed(double ratio) {
            return StrictMath.pow(ratio, regrind);
        }
    }

    /** The truth as kept in the test resources. */
    static Truth load() {
        try (Reader reader = new InputStreamReader(
                Objects.requireNonNull(Truth.class.getResourceAsStream("/scenario/truth.json")),
                StandardCharsets.UTF_8)) {
            return new Gson().fromJson(reader, Truth.class);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** The lot of that name. */
    Lot lot(String name) {
        return lots.stream().filter(lot -> lot.name().equals(name)).findFirst().orElseThrow();
    }

    /** The fresh fluid of a lot at {@code kelvin}. */
    HiddenFluid fluid(Lot lot, double kelvin) {
        return fluid(lot, kelvin, 0);
    }

    /**
     * The fluid of a lot that has been {@code seconds} at {@code kelvin}: temperature shifts times and moduli, chalk
     * amplifies moduli and the strain between the grains.
     */
    HiddenFluid fluid(Lot lot, double kelvin, double seconds) {
        Resin mixed = mixed(lot, broken(lot, kelvin, seconds));
        double filling = chalk.volumeFraction(lot.chalk(), shift.meltDensity());
        HiddenFluid.Mode[] modes = new HiddenFluid.Mode[mixed.modes()];
        for (int i = 0; i < modes.length; i++) {
            double time = mixed.time(i);
            modes[i] = new HiddenFluid.Mode(
                    mixed.modulus(i) * chalk.onModuli(filling) * shift.modulus(kelvin),
                    time * shift.time(kelvin),
                    nonlinear.damping(time) * lot.mixed(lot.dampingRatio()) * chalk.onStrain(filling),
                    nonlinear.secondNormal(time));
        }
        return new HiddenFluid(List.of(modes));
    }

    /** Bonds broken per initial chain after {@code seconds} at {@code kelvin}. */
    private double broken(Lot lot, double kelvin, double seconds) {
        return lot.scissionRate() * shift.reaction(scission.activationEnergy(), kelvin) * seconds;
    }

    /**
     * The unfilled melt of a lot: virgin and regrind mixed linearly in the logarithms of molar mass and peak width with
     * the mass fraction of regrind; shorter chains shorten the times of backbone and branches.
     */
    private Resin mixed(Lot lot, double broken) {
        double length = lot.mixed(lot.molarMassRatio()) / (1 + broken);
        double onTimes = StrictMath.pow(length, scission.viscosityExponent());
        return resin.with(
                resin.backbone().times(onTimes, 1), resin.branches().times(onTimes, lot.mixed(lot.branchWidthRatio())));
    }
}
