package org.meltbook.kernel;

import java.lang.instrument.ClassFileTransformer;
import java.lang.instrument.Instrumentation;
import java.lang.instrument.UnmodifiableClassException;
import java.security.ProtectionDomain;
import org.objectweb.asm.ClassReader;
import org.objectweb.asm.ClassVisitor;
import org.objectweb.asm.ClassWriter;
import org.objectweb.asm.Label;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;

/**
 * Makes {@code Runtime.exit} and {@code Runtime.halt} refuse while a session is open, so that a library, or a call by
 * reflection, cannot end the kernel. It works when the program runs from its jar, whose manifest names this class;
 * elsewhere only direct calls in cells are refused.
 */
public final class ExitGuard {
    private static final String PROPERTY = "org.meltbook.kernel.sessions";
    private static final String RUNTIME = "java/lang/Runtime";

    private ExitGuard() {}

    /**
     * Called by the JVM before the program's main method.
     *
     * @throws UnmodifiableClassException if this JVM does not let the class be changed
     */
    public static void agentmain(String arguments, Instrumentation instrumentation) throws UnmodifiableClassException {
        instrumentation.addTransformer(
                new ClassFileTransformer() {
                    @Override
                    public byte[] transform(
                            ClassLoader loader, String name, Class<?> type, ProtectionDomain domain, byte[] classFile) {
                        return RUNTIME.equals(name) ? refusing(classFile) : null;
                    }
                },
                true);
        instrumentation.retransformClasses(Runtime.class);
    }

    /** One more session is open. */
    static synchronized void raise() {
        System.setProperty(PROPERTY, Integer.toString(Integer.getInteger(PROPERTY, 0) + 1));
    }

    /** One session less is open; after the last one the process may end. */
    static synchronized void lower() {
        int left = Integer.getInteger(PROPERTY, 0) - 1;
        if (left > 0) {
            System.setProperty(PROPERTY, Integer.toString(left));
        } else {
            System.clearProperty(PROPERTY);
        }
    }

    /** The class file of {@code Runtime} whose two methods that end the process first look at the property. */
    static byte[] refusing(byte[] classFile) {
        ClassReader reader = new ClassReader(classFile);
        ClassWriter writer = new ClassWriter(reader, ClassWriter.COMPUTE_MAXS);
        reader.accept(
                new ClassVisitor(Opcodes.ASM9, writer) {
                    @Override
                    public MethodVisitor visitMethod(
                            int access, String name, String descriptor, String signature, String[] exceptions) {
                        MethodVisitor next = super.visitMethod(access, name, descriptor, signature, exceptions);
                        boolean ends = descriptor.equals("(I)V") && (name.equals("exit") || name.equals("halt"));
                        return ends ? new Refusing(next) : next;
                    }
                },
                0);
        return writer.toByteArray();
    }

    private static final class Refusing extends MethodVisitor {
        Refusing(MethodVisitor next) {
            super(Opcodes.ASM9, next);
        }

        @Override
        public void visitCode() {
            super.visitCode();
            Label allowed = new Label();
            visitLdcInsn(PROPERTY);
            visitMethodInsn(
                    Opcodes.INVOKESTATIC,
                    "java/lang/System",
                    "getProperty",
                    "(Ljava/lang/String;)Ljava/lang/String;",
                    false);
            visitJumpInsn(Opcodes.IFNULL, allowed);
            visitTypeInsn(Opcodes.NEW, "java/lang/SecurityException");
            visitInsn(Opcodes.DUP);
            visitLdcInsn(ExitRefused.MESSAGE);
            visitMethodInsn(
                    Opcodes.INVOKESPECIAL, "java/lang/SecurityException", "<init>", "(Ljava/lang/String;)V", false);
            visitInsn(Opcodes.ATHROW);
            visitLabel(allowed);
            visitFrame(Opcodes.F_SAME, 0, null, 0, null);
        }
    }
}
