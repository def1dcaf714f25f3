package org.meltbook.flow;

import java.util.List;
import org.meltbook.base.Doubles;

/**
 * A homogeneous flow: a velocity gradient over time, and the stress components that its symmetry allows.
 *
 * <p>Contract: (1) immutable; (2) {@code gradient} has a value at any finite time in s; (3) between the times of
 * {@code changes}, before the first and after the last, it is constant, and at a change it has its new value already;
 * (4) every stress component that starts at zero and is not among {@code components} stays zero.
 */
public interface Flow {
    /** What the flow is called, with its rate. */
    String name();

    /** The velocity gradient at a time in s. */
    VelocityGradient gradient(double time);

    /** The times in s at which the gradient changes, rising; empty if it never does. */
    Doubles changes();

    /** The stress components that can differ from zero. */
    List<Component> components();
}
