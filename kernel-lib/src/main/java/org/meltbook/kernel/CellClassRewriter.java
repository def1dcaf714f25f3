package org.meltbook.kernel;

import java.util.HashMap;
import java.util.HashSet;
import java.util.Map;
import java.util.Set;
import org.objectweb.asm.ClassReader;
import org.objectweb.asm.ClassVisitor;
import org.objectweb.asm.ClassWriter;
import org.objectweb.asm.Handle;
import org.objectweb.asm.Label;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;
import org.objectweb.asm.Type;

/**
 * Rewrites the class files of cells: a call of {@link CellGuard#check} at each method's start and before each jump
 * backwards, so that any loop can be interrupted, and {@link CellGuard#exit} in the place of calls that end the
 * process. The calls take nothing from the stack and leave nothing on it, so frames and stack sizes stay as they were.
 */
final class CellClassRewriter {
    private static final String GUARD = Type.getInternalName(CellGuard.class);
    private static final String SYSTEM_EXIT = "(I)V";
    private static final String RUNTIME_EXIT = "(Ljava/lang/Runtime;I)V";

    private CellClassRewriter() {}

    static byte[] rewrite(byte[] classFile) {
        ClassReader reader = new ClassReader(classFile);
        Map<String, Integer> firstLines = firstLines(reader);
        ClassWriter writer = new ClassWriter(reader, 0);
        reader.accept(
                new ClassVisitor(Opcodes.ASM9, writer) {
                    @Override
                    public MethodVisitor visitMethod(
                            int access, String name, String descriptor, String signature, String[] exceptions) {
                        return new Guarded(
                                super.visitMethod(access, name, descriptor, signature, exceptions),
                                firstLines.getOrDefault(name + descriptor, 0));
                    }
                },
                0);
        return writer.toByteArray();
    }

    /** The first line of each method that has lines. */
    private static Map<String, Integer> firstLines(ClassReader reader) {
        Map<String, Integer> lines = new HashMap<>();
        reader.accept(
                new ClassVisitor(Opcodes.ASM9) {
                    @Override
                    public MethodVisitor visitMethod(
                            int access, String name, String descriptor, String signature, String[] exceptions) {
                        return new MethodVisitor(Opcodes.ASM9) {
                            @Override
                            public void visitLineNumber(int line, Label start) {
                                lines.putIfAbsent(name + descriptor, line);
                            }
                        };
                    }
                },
                ClassReader.SKIP_FRAMES);
        return lines;
    }

    private static boolean endsProcess(String owner, String name) {
        return owner.equals("java/lang/System") && name.equals("exit")
                || owner.equals("java/lang/Runtime") && (name.equals("exit") || name.equals("halt"));
    }

    private static String refusalFor(String owner) {
        return owner.equals("java/lang/System") ? SYSTEM_EXIT : RUNTIME_EXIT;
    }

    private static final class Guarded extends MethodVisitor {
        private final Set<Label> passed = new HashSet<>();
        private final int firstLine;

        Guarded(MethodVisitor next, int firstLine) {
            super(Opcodes.ASM9, next);
            this.firstLine = firstLine;
        }

        /** The check at the start belongs to the first line; it stands before any label, to which a frame may belong. */
        @Override
        public void visitCode() {
            super.visitCode();
            if (firstLine > 0) {
                Label start = new Label();
                super.visitLabel(start);
                super.visitLineNumber(firstLine, start);
            }
            check();
        }

        @Override
        public void visitLabel(Label label) {
            passed.add(label);
            super.visitLabel(label);
        }

        @Override
        public void visitJumpInsn(int opcode, Label target) {
            if (passed.contains(target)) {
                check();
            }
            super.visitJumpInsn(opcode, target);
        }

        @Override
        public void visitMethodInsn(int opcode, String owner, String name, String descriptor, boolean onInterface) {
            if (endsProcess(owner, name)) {
                super.visitMethodInsn(Opcodes.INVOKESTATIC, GUARD, "exit", refusalFor(owner), false);
            } else {
                super.visitMethodInsn(opcode, owner, name, descriptor, onInterface);
            }
        }

        @Override
        public void visitInvokeDynamicInsn(String name, String descriptor, Handle bootstrap, Object... arguments) {
            Object[] guarded = arguments.clone();
            for (int i = 0; i < guarded.length; i++) {
                if (guarded[i] instanceof Handle handle && endsProcess(handle.getOwner(), handle.getName())) {
                    guarded[i] =
                            new Handle(Opcodes.H_INVOKESTATIC, GUARD, "exit", refusalFor(handle.getOwner()), false);
                }
            }
            super.visitInvokeDynamicInsn(name, descriptor, bootstrap, guarded);
        }

        private void check() {
            super.visitMethodInsn(Opcodes.INVOKESTATIC, GUARD, "check", "()V", false);
        }
    }
}
