package org.meltbook.constitutive;

import java.util.Arrays;
import org.meltbook.base.Doubles;
import org.meltbook.base.RangeException;
import org.meltbook.flow.Component;

/**
 * An extra stress in Pa, tension positive; x flow, y gradient, z neutral.
 *
 * @param components the six components in the order of {@link Component}
 */
public record Stress(Doubles components) {
    /** No stress. */
    public static final Stress NONE = new Stress(Doubles.of(new double[Component.values().length]));

    /** Checks that there are six. */
    public Stress {
        if (components.size() != Component.values().length) {
            throw new RangeException("a stress has six components, found " + components.size());
        }
    }

    /** The stress of simple shear. */
    static Stress shear(double xx, double yy, double zz, double xy) {
        return new Stress(Doubles.of(xx, yy, zz, xy, 0, 0));
    }

    /** One component in Pa. */
    public double at(Component component) {
        return components.at(component.ordinal());
    }

    /** Shear stress σ = τxy in Pa. */
    public double shear() {
        return at(Component.XY);
    }

    /** First normal stress difference N₁ = τxx − τyy in Pa. */
    public double firstNormalDifference() {
        return at(Component.XX) - at(Component.YY);
    }

    /** Second normal stress difference N₂ = τyy − τzz in Pa. */
    public double secondNormalDifference() {
        return at(Component.YY) - at(Component.ZZ);
    }

    /** The sum of both stresses. */
    public Stress plus(Stress other) {
        double[] sum = components.toArray();
        Arrays.setAll(sum, i -> sum[i] + other.components.at(i));
        return new Stress(Doubles.of(sum));
    }
}
