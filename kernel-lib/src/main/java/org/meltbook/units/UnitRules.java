package org.meltbook.units;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.meltbook.units.UnitSpelling.Trait;

/** Which unit may stand beside which quantity, and how to say why one may not. */
final class UnitRules {
    /** Units of each SI unit that laboratories write, most usual first. */
    private static final Map<String, List<String>> USUAL = Map.ofEntries(
            Map.entry("rad/s", List.of("rad/s", "Hz")),
            Map.entry("1/s", List.of("1/s", "1/min", "%/s")),
            Map.entry("Pa", List.of("Pa", "kPa", "MPa", "bar", "psi")),
            Map.entry("Pa·s²", List.of("Pa·s²")),
            Map.entry("Pa·s", List.of("Pa·s", "mPa·s", "kPa·s", "P", "cP")),
            Map.entry("1/Pa", List.of("1/Pa", "1/MPa")),
            Map.entry("s", List.of("s", "ms", "min", "h")),
            Map.entry("K", List.of("K", "°C", "°F")),
            Map.entry("kg/m³", List.of("kg/m³", "g/cm³")),
            Map.entry("kg/mol", List.of("kg/mol", "g/mol")),
            Map.entry("1", List.of("1", "%")),
            Map.entry("m", List.of("m", "cm", "mm", "µm")),
            Map.entry("rad", List.of("rad", "mrad", "°")),
            Map.entry("N·m", List.of("N·m", "mN·m", "µN·m")),
            Map.entry("N", List.of("N", "mN", "kN", "kgf", "lbf")),
            Map.entry("kg/s", List.of("g/10 min", "kg/h", "kg/s")));

    /** What a unit is, by a unit of the same dimension. */
    private static final List<Map.Entry<String, String>> KINDS = List.of(
            Map.entry("1", "a pure number"),
            Map.entry("1/s", "a rate"),
            Map.entry("Pa", "a stress, modulus or pressure"),
            Map.entry("Pa·s", "a viscosity"),
            Map.entry("m²/s", "a kinematic viscosity (it takes the density to make a viscosity of it)"),
            Map.entry("Pa·s²", "a normal stress coefficient"),
            Map.entry("1/Pa", "a compliance"),
            Map.entry("s", "a time"),
            Map.entry("K", "a temperature"),
            Map.entry("kg", "a mass"),
            Map.entry("m", "a length"),
            Map.entry("m²", "an area"),
            Map.entry("m³", "a volume"),
            Map.entry("m/s", "a speed"),
            Map.entry("N", "a force"),
            Map.entry("N·m", "a torque or an energy"),
            Map.entry("W", "a power"),
            Map.entry("kg/m³", "a density"),
            Map.entry("kg/mol", "a molar mass"),
            Map.entry("mol", "an amount of substance"),
            Map.entry("kg/s", "a mass-flow rate"),
            Map.entry("m³/s", "a volume-flow rate"),
            Map.entry("A", "an electric current"),
            Map.entry("C", "an electric charge"));

    private UnitRules() {}

    /** Units that would do for the quantity, most usual first. */
    static List<String> usual(Quantity quantity) {
        return USUAL.get(quantity.siUnit());
    }

    /** What the unit is, in words. */
    static String kind(LabUnit unit) {
        if (unit.is(Trait.CYCLES)) {
            return "a count of cycles per time";
        }
        if (unit.is(Trait.ANGLE)) {
            return unit.sharesDimensionWith(LabUnit.parse("1")) ? "a plane angle" : "an angle per something";
        }
        if (unit.is(Trait.BY_MASS)) {
            return "a share by mass";
        }
        if (unit.is(Trait.BY_VOLUME)) {
            return "a share by volume";
        }
        return KINDS.stream()
                .filter(kind -> unit.sharesDimensionWith(LabUnit.parse(kind.getKey())))
                .map(Map.Entry::getValue)
                .findFirst()
                .orElse("of a kind not met in rheology");
    }

    /** Why the unit cannot measure the quantity; empty if it can. */
    static Optional<String> objection(LabUnit unit, Quantity quantity) {
        if (!unit.sharesDimensionWith(LabUnit.parse(quantity.siUnit())) || !traitsFit(unit, quantity)) {
            return Optional.of(refusal(unit, quantity, "is " + kind(unit)));
        }
        boolean perOtherTime = quantity == Quantity.ANGULAR_FREQUENCY
                && !unit.is(Trait.CYCLES)
                && !unit.is(Trait.ANGLE)
                && unit.scaleTo(LabUnit.parse("1/s")) != 1;
        return perOtherTime ? Optional.of(refusal(unit, quantity, "may count turns or radians")) : Optional.empty();
    }

    private static boolean traitsFit(LabUnit unit, Quantity quantity) {
        boolean angular = quantity == Quantity.ANGULAR_FREQUENCY || quantity == Quantity.ANGLE;
        boolean angleFits = unit.is(Trait.ANGLE) ? angular : quantity != Quantity.ANGLE;
        return angleFits
                && (!unit.is(Trait.CYCLES) || quantity == Quantity.ANGULAR_FREQUENCY)
                && (!unit.is(Trait.BY_MASS) || quantity == Quantity.MASS_FRACTION)
                && (!unit.is(Trait.BY_VOLUME) || quantity == Quantity.VOLUME_FRACTION);
    }

    private static String refusal(LabUnit unit, Quantity quantity, String why) {
        String near = usual(quantity).stream()
                .filter(usual -> letters(usual).equals(letters(unit.text())))
                .findFirst()
                .map(usual -> "; did you mean " + usual + "?")
                .orElse("");
        return "unit '" + unit.text() + "' cannot measure " + quantity.label() + ": it " + why
                + "; units that would do: " + String.join(", ", usual(quantity)) + near;
    }

    private static String letters(String text) {
        return text.toLowerCase(Locale.ROOT).replaceAll("[ .·°]", "");
    }
}
