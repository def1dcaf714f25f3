package org.meltbook.measure;

import java.text.Normalizer;
import java.util.Arrays;
import java.util.HashMap;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.regex.Pattern;
import org.meltbook.units.Quantity;

/**
 * Which names above a column mean which quantity. Words are compared without case, spaces, hyphens and underscores;
 * symbols with case, since T is a temperature and t a time. One line adds a name:
 * {@code Vocabulary.standard().with("Speichermodul", Quantity.STORAGE_MODULUS)}.
 */
public final class Vocabulary {
    private static final Pattern WORD = Pattern.compile("[A-Za-z]{3}");
    private static final Vocabulary STANDARD = nomenclature()
            .and(Quantity.ANGULAR_FREQUENCY, "omega", "frequency", "f")
            .and(Quantity.SHEAR_RATE, "rate", "gamma dot", "dγ/dt")
            .and(Quantity.EXTENSION_RATE, "extension rate", "epsilon dot")
            .and(Quantity.SHEAR_STRESS, "stress", "sigma", "τ", "tau")
            .and(Quantity.FIRST_NORMAL_STRESS_DIFFERENCE, "normal stress difference", "N1")
            .and(Quantity.SECOND_NORMAL_STRESS_DIFFERENCE, "N2")
            .and(Quantity.FIRST_NORMAL_STRESS_COEFFICIENT, "psi1")
            .and(Quantity.VISCOSITY, "shear viscosity", "eta")
            .and(Quantity.COMPLEX_VISCOSITY, "η*", "eta*", "|eta*|")
            .and(Quantity.STORAGE_MODULUS, "storage", "G prime")
            .and(Quantity.LOSS_MODULUS, "loss", "G double prime")
            .and(Quantity.LOSS_TANGENT, "loss factor", "tan(δ)", "tan delta", "tan(delta)")
            .and(Quantity.SHEAR_STRAIN, "strain", "γ", "gamma")
            .and(Quantity.TEMPERATURE, "temp")
            .and(Quantity.VOLUME_FRACTION, "filler volume fraction", "phi")
            .and(Quantity.MASS_FRACTION, "filler mass fraction", "weight fraction");

    private final Map<String, Quantity> names;

    private Vocabulary(Map<String, Quantity> names) {
        this.names = names;
    }

    /** English names and symbols of the Society of Rheology nomenclature, with the ways in which they are typed. */
    public static Vocabulary standard() {
        return STANDARD;
    }

    /** The same with one more name, which stands before any older meaning. */
    public Vocabulary with(String name, Quantity quantity) {
        Map<String, Quantity> more = new HashMap<>(names);
        more.put(key(name), quantity);
        return new Vocabulary(Map.copyOf(more));
    }

    /** Each quantity by its label and its symbol; a symbol that two quantities share names neither. */
    private static Vocabulary nomenclature() {
        Vocabulary names = new Vocabulary(Map.of());
        for (Quantity quantity : Quantity.values()) {
            boolean shared = Arrays.stream(Quantity.values())
                    .anyMatch(other -> other != quantity && key(other.symbol()).equals(key(quantity.symbol())));
            names = shared
                    ? names.and(quantity, quantity.label())
                    : names.and(quantity, quantity.label(), quantity.symbol());
        }
        return names;
    }

    private Vocabulary and(Quantity quantity, String... others) {
        Vocabulary more = this;
        for (String other : others) {
            more = more.with(other, quantity);
        }
        return more;
    }

    /** The quantity that the name means, if it is known. */
    public Optional<Quantity> quantity(String name) {
        return Optional.ofNullable(names.get(key(name)));
    }

    /** Whether two names are one and the same to the vocabulary. */
    static boolean same(String first, String second) {
        return key(first).equals(key(second));
    }

    private static String key(String name) {
        String primes = name.replaceAll("[″“”\"]", "''").replaceAll("[′’‘´`]", "'");
        String joined = Normalizer.normalize(primes, Normalizer.Form.NFKC).replaceAll("[\\s_-]", "");
        return WORD.matcher(joined).find() ? joined.toLowerCase(Locale.ROOT) : joined;
    }
}
