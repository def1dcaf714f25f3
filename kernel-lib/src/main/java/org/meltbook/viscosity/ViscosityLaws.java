package org.meltbook.viscosity;

import java.util.List;

/** The catalogue of viscosity laws. A new law is one class, one line here, and one file of reference values. */
public final class ViscosityLaws {
    private ViscosityLaws() {}

    /** All families, from few parameters to many. */
    public static List<LawFamily> all() {
        return List.of(Newtonian.FAMILY, PowerLaw.FAMILY, Cross.FAMILY, CarreauYasuda.FAMILY);
    }
}
