package org.meltbook.constitutive;

import java.util.List;
import org.meltbook.base.Doubles;
import org.meltbook.figure.Exhibit;

/** What a model answers to a flow: material functions by their standard names, one value a rate or a time. */
public interface Response extends Exhibit {
    /** The model that answered. */
    ConstitutiveModel model();

    /** The extra stress at each rate or time. */
    List<Stress> stresses();

    /** Shear stress σ in Pa. */
    default Doubles shearStress() {
        return Doubles.of(stresses().stream().mapToDouble(Stress::shear).toArray());
    }

    /** First normal stress difference N₁ in Pa. */
    default Doubles firstNormalStressDifference() {
        return Doubles.of(
                stresses().stream().mapToDouble(Stress::firstNormalDifference).toArray());
    }

    /** Second normal stress difference N₂ in Pa. */
    default Doubles secondNormalStressDifference() {
        return Doubles.of(
                stresses().stream().mapToDouble(Stress::secondNormalDifference).toArray());
    }

    /** What to mind with the model. */
    @Override
    default List<String> cautions() {
        return model().limits();
    }
}
