package org.meltbook.notebook;

import org.dflib.jjava.jupyter.Extension;
import org.dflib.jjava.jupyter.kernel.BaseKernel;

/** Teaches another Java kernel of the same family to show what Meltbook makes, once it has the library. */
public final class RenderersExtension implements Extension {
    @Override
    public void install(BaseKernel kernel) {
        Renderers.install(kernel.getRenderer());
    }
}
