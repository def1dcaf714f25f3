package org.meltbook.viscosity;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import com.sun.management.ThreadMXBean;
import java.lang.management.ManagementFactory;
import org.junit.jupiter.api.Test;
import org.meltbook.base.Doubles;
import org.meltbook.base.Progress;
import org.meltbook.fit.Problem;
import org.meltbook.fit.Solver;
import org.meltbook.fit.Workspace;

/** Residuals, derivatives and whole solutions take no memory: the virtual machine counts what a thread allocates. */
class RefitAllocationTest {
    private static final Doubles RATES = Doubles.logSpaced(0.01, 1000, 40);
    private static final Problem PROBLEM = Problem.of(CarreauYasuda.FAMILY.model())
            .data(RATES, RATES.map(CarreauYasuda.of(9000, 0.7, 1.2, 0.4)::at))
            .relative()
            .from(5000, 0.2, 2, 0.5, 0);

    private static long allocated(Runnable work) {
        ThreadMXBean threads = (ThreadMXBean) ManagementFactory.getThreadMXBean();
        long thread = Thread.currentThread().getId();
        work.run(); // classes are loaded and strings made the first time
        long before = threads.getThreadAllocatedBytes(thread);
        for (int k = 0; k < 100; k++) {
            work.run();
        }
        return (threads.getThreadAllocatedBytes(thread) - before) / 100;
    }

    @Test
    void residuals_and_derivatives_allocate_nothing() {
        Workspace workspace = Workspace.of(PROBLEM);
        double[] coordinates = new double[workspace.coordinates()];
        workspace.inward(PROBLEM.start().toArray(), coordinates);
        double[] residuals = new double[workspace.points()];
        double[] jacobian = new double[workspace.points() * workspace.coordinates()];
        assertEquals(0, allocated(() -> workspace.residuals(coordinates, residuals)));
        assertEquals(0, allocated(() -> workspace.linearise(coordinates, residuals, jacobian)));
        assertTrue(residuals[0] != 0 && jacobian[0] != 0);
    }

    @Test
    void a_solver_solves_again_without_allocation() {
        Solver solver = Solver.of(PROBLEM);
        double[] start = new double[solver.workspace().coordinates()];
        solver.coordinates(start);
        assertEquals(0, allocated(() -> {
            solver.start(start);
            solver.solve(Progress.QUIET);
        }));
    }
}
