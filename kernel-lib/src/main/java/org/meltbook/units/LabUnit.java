package org.meltbook.units;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.concurrent.ConcurrentHashMap;
import javax.measure.IncommensurableException;
import javax.measure.Unit;
import javax.measure.UnitConverter;
import javax.measure.format.UnitFormat;
import org.meltbook.units.UnitSpelling.Trait;
import systems.uom.ucum.format.UCUMFormat;
import tech.units.indriya.function.RationalNumber;

/**
 * A unit as it is written in a laboratory file: {@code Pa.s}, {@code mPa·s}, {@code s⁻¹}, {@code °C}, {@code g/10 min}.
 * What it may measure, and by which factor, is decided together with a {@link Quantity}: 1 Hz of an angular frequency
 * is 2π rad/s, and Hz is no unit of a shear rate.
 */
public final class LabUnit {
    private static final int CACHED = 1_000;
    /** Units met before; a unit is a value, so that a cached one cannot be told from a new one. */
    private static final Map<String, LabUnit> KNOWN = new ConcurrentHashMap<>();

    private static final UnitFormat UCUM = UCUMFormat.getInstance(UCUMFormat.Variant.CASE_SENSITIVE);

    private final String text;
    private final UnitSpelling spelling;
    private final Unit<?> unit;
    private final Map<Quantity, Conversion> conversions = new ConcurrentHashMap<>();

    private LabUnit(String text, UnitSpelling spelling, Unit<?> unit) {
        this.text = text;
        this.spelling = spelling;
        this.unit = unit;
    }

    /**
     * The unit that the text names.
     *
     * @param text as written, case matters ({@code mPa} is not {@code MPa}); {@code 1} or {@code -} for a pure number
     * @throws UnitException if the text is blank, not known, or can be read in two ways
     */
    public static LabUnit parse(String text) {
        LabUnit known = KNOWN.get(text);
        if (known != null) {
            return known;
        }
        UnitSpelling spelling = UnitSpelling.of(text);
        LabUnit parsed = new LabUnit(text.strip(), spelling, ucum(text, spelling.code()));
        if (KNOWN.size() < CACHED) {
            KNOWN.put(text, parsed);
        }
        return parsed;
    }

    /** The UCUM parser signals what it does not know by an exception or by an error of its scanner. */
    private static Unit<?> ucum(String text, String code) {
        try {
            synchronized (UCUM) {
                return UCUM.parse(code);
            }
        } catch (VirtualMachineError fatal) {
            throw fatal;
        } catch (RuntimeException | Error refused) {
            throw new UnitException("unit '" + text.strip() + "' is not known (read as UCUM code '" + code + "')");
        }
    }

    /** The unit as it was written. */
    public String text() {
        return text;
    }

    /** The unit in the case-sensitive form of UCUM, the Unified Code for Units of Measure. */
    public String ucum() {
        return spelling.code();
    }

    /** What the unit is, in words: {@code a stress, modulus or pressure}. */
    public String kind() {
        return UnitRules.kind(this);
    }

    /** Whether numbers of the quantity can be given in this unit. */
    public boolean measures(Quantity quantity) {
        return UnitRules.objection(this, quantity).isEmpty();
    }

    /** Units in which the quantity is usually given, each of which {@link #parse} knows. */
    public static List<String> usualFor(Quantity quantity) {
        return UnitRules.usual(quantity);
    }

    /**
     * How numbers of the quantity in this unit become SI.
     *
     * @throws UnitException if the unit cannot measure the quantity: the message says what it is and which would do
     */
    public Conversion conversion(Quantity quantity) {
        return conversions.computeIfAbsent(quantity, this::findConversion);
    }

    private Conversion findConversion(Quantity quantity) {
        Optional<String> objection = UnitRules.objection(this, quantity);
        if (objection.isPresent()) {
            throw new UnitException(objection.get());
        }
        UnitConverter converter = converterTo(parse(quantity.siUnit()));
        BigDecimal offset = decimal(converter.convert(BigDecimal.ZERO));
        BigDecimal scale = decimal(converter.convert(BigDecimal.ONE)).subtract(offset);
        if (!(scale.doubleValue() > 0 && scale.doubleValue() < Double.POSITIVE_INFINITY)) {
            throw new UnitException("unit '" + text + "' has a size of " + scale + ", expected one above zero");
        }
        double cycles = is(Trait.CYCLES) ? 2 * Math.PI : 1;
        return Conversion.of(scale.doubleValue() * cycles, offset.doubleValue());
    }

    /**
     * The number in the SI unit of the quantity.
     *
     * @throws UnitException if the unit cannot measure the quantity
     */
    public double toSi(Quantity quantity, double value) {
        return conversion(quantity).toSi(value);
    }

    /**
     * A number in the SI unit of the quantity, given in this unit.
     *
     * @throws UnitException if the unit cannot measure the quantity
     */
    public double fromSi(Quantity quantity, double value) {
        return conversion(quantity).fromSi(value);
    }

    boolean is(Trait trait) {
        return spelling.traits().contains(trait);
    }

    boolean sharesDimensionWith(LabUnit other) {
        return unit.isCompatible(other.unit);
    }

    double scaleTo(LabUnit other) {
        return converterTo(other).convert(1.0);
    }

    private UnitConverter converterTo(LabUnit other) {
        try {
            return unit.getConverterToAny(other.unit);
        } catch (IncommensurableException | UnsupportedOperationException e) {
            throw new UnitException("unit '" + text + "' cannot be given in " + other.text + ": it is " + kind());
        }
    }

    private static BigDecimal decimal(Number number) {
        if (number instanceof BigDecimal exact) {
            return exact;
        }
        if (number instanceof RationalNumber ratio) {
            return new BigDecimal(ratio.getDividend())
                    .divide(new BigDecimal(ratio.getDivisor()), MathContext.DECIMAL128);
        }
        return new BigDecimal(number.toString());
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof LabUnit that && text.equals(that.text);
    }

    @Override
    public int hashCode() {
        return text.hashCode();
    }

    /** The unit as it was written. */
    @Override
    public String toString() {
        return text;
    }
}
