package org.meltbook.constitutive;

import org.meltbook.base.Doubles;
import org.meltbook.figure.Exhibit;

/** What a model answers to a flow: material functions by their standard names, one value a rate or a time. */
public interface Response extends Exhibit {
    /** The model that answered. */
    ConstitutiveModel model();

    /** Shear stress σ in Pa. */
    Doubles shearStress();

    /** First normal stress difference N₁ in Pa. */
    Doubles firstNormalStressDifference();

    /** Second normal stress difference N₂ in Pa. */
    Doubles secondNormalStressDifference();
}
