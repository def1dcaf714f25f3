package org.meltbook.units;

import java.text.Normalizer;
import java.util.EnumSet;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import java.util.regex.Matcher;
import java.util.regex.Pattern;

/**
 * A unit as laboratories spell it, turned into its case-sensitive UCUM code.
 *
 * @param code   the UCUM code
 * @param traits what the spelling tells beyond the dimension
 */
record UnitSpelling(String code, Set<Trait> traits) {
    /** What a dimension does not tell. */
    enum Trait {
        /** Counts whole cycles: Hz, rpm. */
        CYCLES,
        /** Counts radians or degrees. */
        ANGLE,
        /** A share by mass: wt%. */
        BY_MASS,
        /** A share by volume: vol%. */
        BY_VOLUME
    }

    private static final int LONGEST = 40;

    /** Spellings of a whole unit, without spaces, points and hyphens, in lower case. */
    private static final Map<String, UnitSpelling> SHARES = Map.ofEntries(
            share("wt%", Trait.BY_MASS),
            share("mass%", Trait.BY_MASS),
            share("%w/w", Trait.BY_MASS),
            share("vol%", Trait.BY_VOLUME),
            share("%v/v", Trait.BY_VOLUME));

    /** Names inside a unit that UCUM spells in another way. */
    private static final Map<String, String> NAMES = Map.ofEntries(
            Map.entry("Pas", "(Pa.s)"),
            Map.entry("mPas", "(mPa.s)"),
            Map.entry("kPas", "(kPa.s)"),
            Map.entry("MPas", "(MPa.s)"),
            Map.entry("Nm", "(N.m)"),
            Map.entry("mNm", "(mN.m)"),
            Map.entry("uNm", "(uN.m)"),
            Map.entry("nNm", "(nN.m)"),
            Map.entry("sec", "s"),
            Map.entry("hr", "h"),
            Map.entry("rpm", "(1/min)"),
            Map.entry("°C", "Cel"),
            Map.entry("degC", "Cel"),
            Map.entry("°F", "[degF]"),
            Map.entry("degF", "[degF]"),
            Map.entry("°", "deg"),
            Map.entry("psi", "[psi]"),
            Map.entry("mmHg", "mm[Hg]"),
            Map.entry("lbf", "[lbf_av]"),
            Map.entry("lb", "[lb_av]"),
            Map.entry("in", "[in_i]"),
            Map.entry("inch", "[in_i]"),
            Map.entry("dyne", "dyn"),
            Map.entry("poise", "P"),
            Map.entry("Poise", "P"),
            Map.entry("cc", "cm3"),
            Map.entry("ppm", "[ppm]"),
            // Common practice: the dalton stands for the molar mass of a chain.
            Map.entry("Da", "(g/mol)"),
            Map.entry("kDa", "(kg/mol)"));

    private static final Pattern NAME = Pattern.compile("\\[[^\\]]*\\]|[A-Za-z°]+");
    private static final Pattern POWER = Pattern.compile("\\^\\{?([+-]?\\d+)\\}?");
    private static final Pattern PER_TEN_MINUTES = Pattern.compile("/\\s*10\\s*min$");
    private static final Pattern ANGLE_NAME = Pattern.compile("[mu]?rad|deg");

    private static Map.Entry<String, UnitSpelling> share(String text, Trait trait) {
        return Map.entry(text, new UnitSpelling("%", EnumSet.of(trait)));
    }

    /**
     * The code of a unit text.
     *
     * @throws UnitException if the text is blank, or can be read in two ways
     */
    static UnitSpelling of(String text) {
        String plain = plain(text);
        if (plain.matches("[-–—]")) {
            return new UnitSpelling("1", EnumSet.noneOf(Trait.class));
        }
        UnitSpelling share = SHARES.get(plain.replaceAll("[ .-]", "").toLowerCase(Locale.ROOT));
        if (share != null) {
            return share;
        }
        String joined = plain.replaceAll("(°|\\bdeg) (?=[CF]$)", "$1");
        joined = POWER.matcher(joined).replaceAll("$1");
        joined = PER_TEN_MINUTES.matcher(joined).replaceAll("/(10.min)");
        joined = joined.replaceAll("\\s*([/.()])\\s*", "$1").replace(' ', '.');
        refuseTwoReadings(text, joined);
        return named(joined);
    }

    /** One form for the many letters that look alike: superscripts, minus signs, micro signs, middle dots. */
    private static String plain(String text) {
        if (text.length() > LONGEST) {
            throw new UnitException("'" + text.substring(0, LONGEST) + "…' is too long for a unit");
        }
        String plain = Normalizer.normalize(text, Normalizer.Form.NFKC)
                .replace('μ', 'u')
                .replace('−', '-')
                .replaceAll("[·⋅∙•×*]", ".")
                .replaceAll("\\s+", " ")
                .strip();
        if (plain.isEmpty()) {
            throw new UnitException(
                    "a unit is missing: found blank text, expected a unit such as Pa, 1/s, or 1 for none");
        }
        return plain;
    }

    /** {@code W/m.K} may mean W·K/m or W/(m·K), and {@code g/10.min} likewise: nobody should have to guess. */
    private static void refuseTwoReadings(String text, String joined) {
        int depth = 0;
        boolean divided = false;
        for (char c : joined.toCharArray()) {
            depth += c == '(' ? 1 : c == ')' ? -1 : 0;
            divided |= c == '/' && depth == 0;
            if (c == '.' && depth == 0 && divided) {
                throw new UnitException(
                        "'" + text + "' can be read in two ways, as a/(b·c) and as (a/b)·c: put brackets,"
                                + " as in g/(10.min) or W/(m·K)");
            }
        }
        if (joined.matches(".*\\d\\.\\d.*")) {
            throw new UnitException("'" + text + "' holds a decimal number, which has no place in a unit");
        }
        if (joined.matches("\\d.*") && !joined.matches("1(/.*)?")) {
            throw new UnitException("'" + text + "' begins with a number, which belongs to the values");
        }
        if (joined.indexOf('{') >= 0) {
            throw new UnitException(
                    "'" + text + "' holds braces, which UCUM passes over; expected a unit without remarks");
        }
    }

    /** A squared angle has the dimension of an angle, which is none: it must not pass for one. */
    private static void refusePower(String joined, int end) {
        if (end < joined.length() && "+-0123456789".indexOf(joined.charAt(end)) >= 0) {
            throw new UnitException("'" + joined + "' holds a power of an angle, which measures nothing here");
        }
    }

    private static UnitSpelling named(String joined) {
        Set<Trait> traits = EnumSet.noneOf(Trait.class);
        Matcher names = NAME.matcher(joined);
        StringBuilder code = new StringBuilder();
        while (names.find()) {
            String name = names.group();
            String ucum = NAMES.getOrDefault(name, name);
            if (name.endsWith("Hz") || name.equals("rpm")) {
                traits.add(Trait.CYCLES);
            } else if (ANGLE_NAME.matcher(ucum).matches()) {
                refusePower(joined, names.end());
                traits.add(Trait.ANGLE);
            }
            names.appendReplacement(code, Matcher.quoteReplacement(ucum));
        }
        return new UnitSpelling(names.appendTail(code).toString(), traits);
    }
}
