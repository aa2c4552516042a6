package org.stillpath.formula;

import java.lang.invoke.MethodHandles;
import java.util.ArrayList;
import java.util.List;
import org.objectweb.asm.ClassWriter;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;
import org.objectweb.asm.Type;

/**
 * A hidden class that stands for a formula: what {@link Compiler} and {@link BlockCompiler} have in common. All its methods take
 * the same parameters, so that a long formula can be several of them; a {@link Kernel} and a {@link BlockKernel} differ in the
 * room that the caller lends, which comes last. Mutable, for one class.
 */
final class KernelClass {
    static final int THIS = 0;
    static final int X = 1;
    static final int Y = 2;
    static final int Z = 3;
    /** The number of points, or in a part that is called for one point the number of that. */
    static final int COUNT = 4;

    static final int ARGUMENTS = 5;
    static final int WAVELENGTH = 6;
    static final int CHARTS = 8;
    static final int OUT = 9;
    /** The first of the arrays that the caller lends. */
    static final int ROOM = 10;

    private static final String SAMPLES = Type.getInternalName(Samples.class);
    /** Names of the arrays of {@link Samples}, in the order of a program's outputs. */
    private static final List<String> COMPONENTS =
            List.of("value", "gx", "gy", "gz", "hxx", "hxy", "hxz", "hyy", "hyz", "hzz");

    private static final String OBJECT = Type.getInternalName(Object.class);

    private final ClassWriter writer = new ClassWriter(ClassWriter.COMPUTE_MAXS);
    private final String name;
    private final List<Object> parameters = new ArrayList<>();
    private final String descriptor;

    /**
     * @param kind the interface that it implements
     * @param room types of the arrays that the caller lends
     */
    KernelClass(Class<?> kind, Class<?>... room) {
        name = Type.getInternalName(kind) + "Compiled";
        parameters.addAll(
                List.of(name, "[D", "[D", "[D", Opcodes.INTEGER, "[D", Opcodes.DOUBLE, "[L" + SAMPLES + ";", SAMPLES));
        StringBuilder text = new StringBuilder("([D[D[DI[DD[L" + SAMPLES + ";L" + SAMPLES + ";");
        for (Class<?> array : room) {
            parameters.add(Type.getDescriptor(array));
            text.append(Type.getDescriptor(array));
        }
        descriptor = text + ")V";
        writer.visit(
                Opcodes.V17,
                Opcodes.ACC_FINAL | Opcodes.ACC_SUPER | Opcodes.ACC_SYNTHETIC,
                name,
                null,
                OBJECT,
                new String[] {Type.getInternalName(kind)});
        MethodVisitor made = method(0, "<init>", "()V");
        made.visitVarInsn(Opcodes.ALOAD, THIS);
        made.visitMethodInsn(Opcodes.INVOKESPECIAL, OBJECT, "<init>", "()V", false);
        end(made);
    }

    /** Begins a method with the common parameters. */
    MethodVisitor begin(int access, String method) {
        return method(access, method, descriptor);
    }

    private MethodVisitor method(int access, String method, String parameterTypes) {
        MethodVisitor code = writer.visitMethod(access, method, parameterTypes, null, null);
        code.visitCode();
        return code;
    }

    static void end(MethodVisitor code) {
        code.visitInsn(Opcodes.RETURN);
        code.visitMaxs(0, 0);
        code.visitEnd();
    }

    /** The first local behind the parameters. */
    int firstFree() {
        return parameters.size() + 1; // the wavelength takes two
    }

    /** Types of the parameters, as a frame has them; a list of the caller's own. */
    List<Object> frame() {
        return new ArrayList<>(parameters);
    }

    /** Calls a method of this class with the parameters of the method that calls, {@code number} standing for the count. */
    void call(MethodVisitor code, String method, int number) {
        code.visitVarInsn(Opcodes.ALOAD, THIS);
        code.visitVarInsn(Opcodes.ALOAD, X);
        code.visitVarInsn(Opcodes.ALOAD, Y);
        code.visitVarInsn(Opcodes.ALOAD, Z);
        code.visitVarInsn(Opcodes.ILOAD, number);
        code.visitVarInsn(Opcodes.ALOAD, ARGUMENTS);
        code.visitVarInsn(Opcodes.DLOAD, WAVELENGTH);
        code.visitVarInsn(Opcodes.ALOAD, CHARTS);
        for (int room = OUT; room < firstFree(); room++) {
            code.visitVarInsn(Opcodes.ALOAD, room);
        }
        code.visitMethodInsn(Opcodes.INVOKESPECIAL, name, method, descriptor, false);
    }

    /** Brings an array of the samples on the stack to it: that of an output, or of a component of a charted coordinate. */
    static void component(MethodVisitor code, int number) {
        code.visitFieldInsn(Opcodes.GETFIELD, SAMPLES, COMPONENTS.get(number), "[D");
    }

    /** Brings the array of a chart's component to the stack, by {@link Op#CHART}'s index. */
    static void chart(MethodVisitor code, int index) {
        code.visitVarInsn(Opcodes.ALOAD, CHARTS);
        Compiler.push(code, index / 10);
        code.visitInsn(Opcodes.AALOAD);
        component(code, index % 10);
    }

    /** The class file. */
    byte[] file() {
        writer.visitEnd();
        return writer.toByteArray();
    }

    /** Loads a class file of this package and makes its one object. */
    static Object load(byte[] file) {
        try {
            return MethodHandles.lookup()
                    .defineHiddenClass(file, true)
                    .lookupClass()
                    .getDeclaredConstructor()
                    .newInstance();
        } catch (ReflectiveOperationException e) {
            throw new IllegalStateException("a compiled formula cannot be loaded", e);
        }
    }
}
