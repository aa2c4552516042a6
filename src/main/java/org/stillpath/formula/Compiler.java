package org.stillpath.formula;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Collections;
import java.util.Deque;
import java.util.List;
import java.util.Optional;
import java.util.function.IntConsumer;
import org.objectweb.asm.Label;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;
import org.objectweb.asm.Type;

/**
 * Translates a {@link Program} into a hidden class: what does not depend on the place once a call, the rest in one loop
 * over the points, every result in a local variable. Written with ASM, against a source compiler, which gives the same
 * code after a second and a half of set-up, and against chains of method handles, which HotSpot inlines only up to a
 * depth. The first translation of a process costs about 50 ms, most of it for loading ASM, a later one 1 ms or less;
 * {@link Executable} decides when that is worthwhile.
 *
 * <p>HotSpot leaves methods of 8000 bytes and more to its interpreter, so a long program becomes several methods, each
 * called for one point, which hand results on through an array of the caller.
 *
 * <p>Operations are the same calls in the same order as the {@link Evaluator}'s and nothing is contracted, so that the
 * results are equal bit by bit. Nothing of a formula's text enters the class: its names are constants, arguments are
 * numbered, numbers are binary.
 */
final class Compiler {
    /**
     * Longer programs are left to the evaluator. Of texts up to the longest that is read, only Hessians of products of
     * some two hundred different factors were found to be longer; at this size a class file has 300 kB.
     */
    static final int LARGEST_PROGRAM = 20_000;

    /** HotSpot's limit, in bytes. */
    private static final int LONGEST_METHOD = 8_000;

    /** Longer programs cannot fit one method, at three bytes an operation and more. */
    private static final int MOST_TOGETHER = 2_500;

    /** Bytes that the operations of a part take by the counts below, which err upwards; its results take 400 more. */
    private static final int PART_BUDGET = 7_500;

    /** Bytes of an operation with the storing of its result in a local and in the scratch array. */
    private static final int OPERATION = 26;
    /** Bytes that bring an operand to the stack. */
    private static final int LOAD = 4;
    /** Bytes that bring a scratch cell to a local. */
    private static final int FETCH = 10;

    /**
     * A translated program.
     *
     * @param kernel its code
     * @param scratch how many numbers it needs room for in its caller's scratch array
     */
    record Compiled(Kernel kernel, int scratch) {}

    /** A run of operations that one method computes, from the first to before the last. */
    private record Part(int from, int to) {}

    private final Program program;
    private final KernelClass target = new KernelClass(Kernel.class, double[].class);
    /** Which scratch cell a result has that goes from one method to another; -1 for the others. */
    private final int[] cells;

    private int scratch;

    private Compiler(Program program) {
        this.program = program;
        this.cells = new int[program.size()];
        Arrays.fill(cells, -1);
    }

    /** The code of a program; none if it is longer than {@link #LARGEST_PROGRAM}. */
    static Optional<Compiled> compile(Program program) {
        if (program.size() > LARGEST_PROGRAM) {
            return Optional.empty();
        }
        ClassFile file = translate(program);
        return Optional.of(new Compiled((Kernel) KernelClass.load(file.code()), file.scratch()));
    }

    /**
     * A translated program that is not loaded yet.
     *
     * @param code the class file
     * @param scratch how many numbers it needs room for
     */
    record ClassFile(byte[] code, int scratch) {}

    static ClassFile translate(Program program) {
        if (program.size() <= MOST_TOGETHER) {
            Compiler compiler = new Compiler(program);
            if (compiler.whole() < LONGEST_METHOD) {
                return compiler.file();
            }
        }
        Compiler compiler = new Compiler(program);
        compiler.parts();
        return compiler.file();
    }

    private ClassFile file() {
        return new ClassFile(target.file(), scratch);
    }

    /** Writes everything into one method a kind of call; gives the greater length in bytes. */
    private int whole() {
        MethodVisitor one = target.begin(Opcodes.ACC_PUBLIC, "one");
        Body alone = new Body(one, KernelClass.COUNT, target.firstFree(), 0);
        alone.compute(0, program.size());
        alone.writeAll();
        KernelClass.end(one);
        MethodVisitor run = target.begin(Opcodes.ACC_PUBLIC, "run");
        int point = target.firstFree();
        Body body = new Body(run, point, point + 1, 0);
        body.compute(0, program.invariants());
        loop(run, point, body.next, () -> {
            body.compute(program.invariants(), program.size());
            body.writeAll();
        });
        Label last = new Label();
        run.visitLabel(last);
        KernelClass.end(run);
        return last.getOffset() + 1;
    }

    /** Writes several methods and one that calls them. */
    private void parts() {
        List<Part> before = cut(0, program.invariants());
        List<Part> within = cut(program.invariants(), program.size());
        placeCells(before, within);
        List<String> outside = new ArrayList<>();
        for (Part part : before) {
            outside.add(part(part, "invariants" + outside.size(), false));
        }
        List<String> inside = new ArrayList<>();
        for (Part part : within) {
            inside.add(part(part, "part" + inside.size(), inside.size() == within.size() - 1));
        }
        MethodVisitor run = target.begin(Opcodes.ACC_PUBLIC, "run");
        outside.forEach(name -> target.call(run, name, KernelClass.COUNT));
        loop(
                run,
                target.firstFree(),
                target.firstFree() + 1,
                () -> inside.forEach(name -> target.call(run, name, target.firstFree())));
        KernelClass.end(run);
        MethodVisitor one = target.begin(Opcodes.ACC_PUBLIC, "one");
        outside.forEach(name -> target.call(one, name, KernelClass.COUNT));
        inside.forEach(name -> target.call(one, name, KernelClass.COUNT));
        KernelClass.end(one);
    }

    private String part(Part part, String name, boolean last) {
        MethodVisitor code = target.begin(Opcodes.ACC_PRIVATE, name);
        Body body = new Body(code, KernelClass.COUNT, target.firstFree(), part.from());
        body.compute(part.from(), part.to());
        for (int k = 0; k < program.outputs().size(); k++) {
            int o = program.outputs().get(k);
            boolean own = o >= part.from() && o < part.to() && o >= program.invariants();
            if (own || (last && o < program.invariants())) {
                body.write(k);
            }
        }
        KernelClass.end(code);
        return name;
    }

    /** A loop over the points; {@code next} is the first local without a value before it, those behind {@code point} numbers. */
    private void loop(MethodVisitor run, int point, int next, Runnable inside) {
        List<Object> locals = target.frame();
        locals.add(Opcodes.INTEGER);
        locals.addAll(Collections.nCopies((next - point - 1) / 2, Opcodes.DOUBLE));
        Object[] frame = locals.toArray();
        Label head = new Label();
        Label exit = new Label();
        run.visitInsn(Opcodes.ICONST_0);
        run.visitVarInsn(Opcodes.ISTORE, point);
        run.visitLabel(head);
        run.visitFrame(Opcodes.F_FULL, frame.length, frame, 0, new Object[0]);
        run.visitVarInsn(Opcodes.ILOAD, point);
        run.visitVarInsn(Opcodes.ILOAD, KernelClass.COUNT);
        run.visitJumpInsn(Opcodes.IF_ICMPGE, exit);
        inside.run();
        run.visitIincInsn(point, 1);
        run.visitJumpInsn(Opcodes.GOTO, head);
        run.visitLabel(exit);
        run.visitFrame(Opcodes.F_FULL, frame.length, frame, 0, new Object[0]);
    }

    /** Cuts operations into parts that fit a method each; at least one part. */
    private List<Part> cut(int from, int to) {
        List<Part> parts = new ArrayList<>();
        boolean[] fetched = new boolean[program.size()];
        int start = from;
        int bytes = 0;
        for (int i = from; i < to; i++) {
            int cost = cost(i, start, fetched);
            if (bytes + cost > PART_BUDGET) {
                parts.add(new Part(start, i));
                start = i;
                bytes = 0;
                Arrays.fill(fetched, false);
                cost = cost(i, start, fetched);
            }
            bytes += cost;
        }
        parts.add(new Part(start, to));
        return parts;
    }

    private int cost(int i, int start, boolean[] fetched) {
        Program.Instruction in = program.instructions().get(i);
        int sum = OPERATION;
        for (int k = 0; k < in.operands(); k++) {
            int o = in.operand(k);
            sum += LOAD;
            if (o < start && !fetched[o]) {
                fetched[o] = true;
                sum += FETCH;
            }
        }
        return sum;
    }

    /** Gives a scratch cell to each result that another method than its own needs. */
    private void placeCells(List<Part> before, List<Part> within) {
        int[] home = new int[program.size()];
        int number = 0;
        for (List<Part> parts : List.of(before, within)) {
            for (Part part : parts) {
                Arrays.fill(home, part.from(), part.to(), number++);
            }
        }
        for (int i = 0; i < program.size(); i++) {
            Program.Instruction in = program.instructions().get(i);
            for (int k = 0; k < in.operands(); k++) {
                if (home[in.operand(k)] != home[i]) {
                    placeCell(in.operand(k));
                }
            }
        }
        for (int o : program.outputs()) {
            if (o < program.invariants()) {
                placeCell(o);
            }
        }
    }

    private void placeCell(int o) {
        if (cells[o] < 0 && program.instructions().get(o).op() != Op.CONSTANT) {
            cells[o] = scratch++;
        }
    }

    /** Writes operations into one method and keeps the account of its locals. Mutable, for one method. */
    private final class Body {
        private final MethodVisitor code;
        /** Local that holds the number of the point. */
        private final int point;
        /** Operations before this one are another method's. */
        private final int start;
        /** Local of each result; -1 if it has none. */
        private final int[] locals = new int[program.size()];
        /** The last operation that needs a result. */
        private final int[] last = new int[program.size()];

        private final Deque<Integer> free = new ArrayDeque<>();
        private int next;

        Body(MethodVisitor code, int point, int next, int start) {
            this.code = code;
            this.point = point;
            this.next = next;
            this.start = start;
            Arrays.fill(locals, -1);
            for (int i = 0; i < last.length; i++) {
                Program.Instruction in = program.instructions().get(i);
                for (int k = 0; k < in.operands(); k++) {
                    last[in.operand(k)] = i;
                }
            }
            for (int o : program.outputs()) {
                last[o] = Integer.MAX_VALUE;
            }
        }

        void compute(int from, int to) {
            for (int i = from; i < to; i++) {
                Program.Instruction in = program.instructions().get(i);
                if (in.op() == Op.CONSTANT) {
                    continue;
                }
                for (int k = 0; k < in.operands(); k++) {
                    fetch(in.operand(k));
                }
                operation(in);
                for (int k = 0; k < in.operands(); k++) {
                    release(in.operand(k), i);
                }
                locals[i] = free.isEmpty() ? fresh() : free.pop();
                code.visitVarInsn(Opcodes.DSTORE, locals[i]);
                if (cells[i] >= 0) {
                    code.visitVarInsn(Opcodes.ALOAD, KernelClass.ROOM);
                    push(code, cells[i]);
                    code.visitVarInsn(Opcodes.DLOAD, locals[i]);
                    code.visitInsn(Opcodes.DASTORE);
                }
            }
        }

        private int fresh() {
            next += 2;
            return next - 2;
        }

        /** Brings a result of another method into a local. */
        private void fetch(int o) {
            if (locals[o] < 0 && o < start && cells[o] >= 0) {
                code.visitVarInsn(Opcodes.ALOAD, KernelClass.ROOM);
                push(code, cells[o]);
                code.visitInsn(Opcodes.DALOAD);
                locals[o] = free.isEmpty() ? fresh() : free.pop();
                code.visitVarInsn(Opcodes.DSTORE, locals[o]);
            }
        }

        /** Frees the local of a result that is not needed after this operation. */
        private void release(int o, int at) {
            boolean carriedIntoLoop = o < program.invariants() && at >= program.invariants() && start == 0;
            if (last[o] == at && locals[o] >= 0 && !carriedIntoLoop) {
                free.push(locals[o]);
                locals[o] = -1;
            }
        }

        private void load(int o) {
            Program.Instruction in = program.instructions().get(o);
            if (in.op() == Op.CONSTANT) {
                number(code, in.value());
            } else {
                code.visitVarInsn(Opcodes.DLOAD, locals[o]);
            }
        }

        void writeAll() {
            for (int k = 0; k < program.outputs().size(); k++) {
                write(k);
            }
        }

        /** Writes the result of a program's output; an overflow of the value is as undefined as a domain fault. */
        void write(int output) {
            int o = program.outputs().get(output);
            fetch(o);
            code.visitVarInsn(Opcodes.ALOAD, KernelClass.OUT);
            KernelClass.component(code, output);
            code.visitVarInsn(Opcodes.ILOAD, point);
            load(o);
            if (output == 0) {
                number(code, 0);
                load(o);
                code.visitInsn(Opcodes.DMUL);
                code.visitInsn(Opcodes.DADD);
            }
            code.visitInsn(Opcodes.DASTORE);
        }

        private void operation(Program.Instruction in) {
            switch (in.op()) {
                case ARGUMENT -> {
                    code.visitVarInsn(Opcodes.ALOAD, KernelClass.ARGUMENTS);
                    push(code, in.index());
                    code.visitInsn(Opcodes.DALOAD);
                }
                case WAVELENGTH -> code.visitVarInsn(Opcodes.DLOAD, KernelClass.WAVELENGTH);
                case X -> coordinate(KernelClass.X);
                case Y -> coordinate(KernelClass.Y);
                case Z -> coordinate(KernelClass.Z);
                case CHART -> {
                    KernelClass.chart(code, in.index());
                    code.visitVarInsn(Opcodes.ILOAD, point);
                    code.visitInsn(Opcodes.DALOAD);
                }
                default -> operate(code, in, this::load);
            }
        }

        private void coordinate(int array) {
            code.visitVarInsn(Opcodes.ALOAD, array);
            code.visitVarInsn(Opcodes.ILOAD, point);
            code.visitInsn(Opcodes.DALOAD);
        }
    }

    /** Pushes a number. */
    static void number(MethodVisitor code, double v) {
        long bits = Double.doubleToRawLongBits(v);
        if (bits == 0) {
            code.visitInsn(Opcodes.DCONST_0);
        } else if (v == 1) {
            code.visitInsn(Opcodes.DCONST_1);
        } else {
            code.visitLdcInsn(v);
        }
    }

    /** Pushes a small whole number. */
    static void push(MethodVisitor code, int n) {
        if (n <= Byte.MAX_VALUE) {
            code.visitIntInsn(Opcodes.BIPUSH, n);
        } else {
            code.visitIntInsn(Opcodes.SIPUSH, n);
        }
    }

    /** Writes an operation on operands, each brought to the stack by {@code load}. */
    static void operate(MethodVisitor code, Program.Instruction in, IntConsumer load) {
        if (in.op() == Op.RECIPROCAL) {
            number(code, 1);
        }
        for (int k = 0; k < in.operands(); k++) {
            load.accept(in.operand(k));
        }
        switch (in.op()) {
            case ADD -> code.visitInsn(Opcodes.DADD);
            case SUBTRACT -> code.visitInsn(Opcodes.DSUB);
            case MULTIPLY -> code.visitInsn(Opcodes.DMUL);
            case NEGATE -> code.visitInsn(Opcodes.DNEG);
            case RECIPROCAL -> code.visitInsn(Opcodes.DDIV);
            case RECIPROCAL_OR_ZERO -> call(code, Special.class, "reciprocalOrZero", in);
            case UNLESS_ZERO -> call(code, Special.class, "unlessZero", in);
            case IF_LESS -> call(code, Special.class, "ifLess", in);
            case POWER -> call(code, Math.class, "pow", in);
            case SQRT -> call(code, Math.class, "sqrt", in);
            case EXP -> call(code, Math.class, "exp", in);
            case LOG -> call(code, Math.class, "log", in);
            case LOG10 -> call(code, Math.class, "log10", in);
            case SIN -> call(code, Math.class, "sin", in);
            case COS -> call(code, Math.class, "cos", in);
            case TAN -> call(code, Math.class, "tan", in);
            case ASIN -> call(code, Math.class, "asin", in);
            case ACOS -> call(code, Math.class, "acos", in);
            case ATAN -> call(code, Math.class, "atan", in);
            case ATAN2 -> call(code, Math.class, "atan2", in);
            case SINH -> call(code, Math.class, "sinh", in);
            case COSH -> call(code, Math.class, "cosh", in);
            case TANH -> call(code, Math.class, "tanh", in);
            case SECH -> call(code, Special.class, "sech", in);
            case ERF -> call(code, Special.class, "erf", in);
            case E1 -> call(code, Special.class, "e1", in);
            case ABS -> call(code, Math.class, "abs", in);
            case SIGN -> call(code, Math.class, "signum", in);
            case MIN -> call(code, Math.class, "min", in);
            case MAX -> call(code, Math.class, "max", in);
            default -> throw new IllegalArgumentException("no operation of a program: " + in.op());
        }
    }

    private static void call(MethodVisitor code, Class<?> owner, String name, Program.Instruction in) {
        String descriptor = "(" + "D".repeat(in.operands()) + ")D";
        code.visitMethodInsn(Opcodes.INVOKESTATIC, Type.getInternalName(owner), name, descriptor, false);
    }
}
