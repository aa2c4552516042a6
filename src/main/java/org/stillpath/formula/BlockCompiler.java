package org.stillpath.formula;

import java.util.ArrayDeque;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.Deque;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.objectweb.asm.Label;
import org.objectweb.asm.MethodVisitor;
import org.objectweb.asm.Opcodes;
import org.objectweb.asm.Type;

/**
 * Translates a {@link Program} into a hidden class that computes a block of points by many short loops, a method each, which
 * hand results on in rows of a few dozen numbers that stay in the processor's nearest cache. HotSpot makes vector code of loops
 * with few plain operations, and of nothing longer (its limit on unrolling); exponentials, logarithms, sines and
 * cosines are loops of {@link Elementary}, all else is computed one point at a time between them. A product that only a sum
 * needs is fused with it, so that the last digit may differ from that of {@link Compiler}'s code; what a point gives does not
 * depend on the points beside it.
 */
final class BlockCompiler {
    /** Operations in a loop at most: measured on loops of formulas, three and four were the quickest. */
    private static final int LONGEST = 4;
    /** Longer programs, and ones with more invariants, are left to {@link Compiler}. */
    private static final int LARGEST_PROGRAM = 2_000;

    private static final int MOST_INVARIANTS = 300;

    private static final String ELEMENTARY = Type.getInternalName(Elementary.class);
    private static final String ARRAYS = Type.getInternalName(Arrays.class);
    private static final int ROWS = KernelClass.ROOM;
    private static final int CELLS = ROWS + 1;

    /** Rows that the elementary functions use as scratch. */
    private static final int SCRATCH_ROWS = 2;

    /**
     * A translated program.
     *
     * @param kernel its code
     * @param rows how many rows it needs
     * @param cells how many numbers for invariants
     */
    record Compiled(BlockKernel kernel, int rows, int cells) {}

    private final Program program;
    private final KernelClass target = new KernelClass(BlockKernel.class, double[][].class, double[].class);
    /** How often a result is used, by operations and as an output. */
    private final int[] uses;
    /** A product that is computed within the sum that alone needs it. */
    private final boolean[] absorbed;
    /** The row of a result; -1 where it has none (yet, or any more). */
    private final int[] row;
    /** Step that uses a result last, by the number of the step; outputs that are not written at once do not exist. */
    private final int[] lastStep;

    private final int[] step;
    private final Deque<Integer> freeRows = new ArrayDeque<>();
    private int rows = SCRATCH_ROWS;

    private BlockCompiler(Program program) {
        this.program = program;
        int n = program.size();
        uses = new int[n];
        absorbed = new boolean[n];
        row = new int[n];
        lastStep = new int[n];
        step = new int[n];
        Arrays.fill(row, -1);
        Arrays.fill(step, -1);
        for (Program.Instruction in : program.instructions()) {
            for (int k = 0; k < in.operands(); k++) {
                uses[in.operand(k)]++;
            }
        }
        for (int o : program.outputs()) {
            uses[o] += 2;
        }
        for (int i = program.invariants(); i < n; i++) {
            int product = fused(i);
            if (product >= 0) {
                absorbed[product] = true;
            }
        }
    }

    /** The code of a program; none if it is too long, or nothing in it depends on the place. */
    static Optional<Compiled> compile(Program program) {
        if (program.size() > LARGEST_PROGRAM || program.invariants() > MOST_INVARIANTS) {
            return Optional.empty();
        }
        BlockCompiler compiler = new BlockCompiler(program);
        BlockKernel kernel = (BlockKernel) KernelClass.load(compiler.translate());
        return Optional.of(new Compiled(kernel, compiler.rows, program.invariants()));
    }

    private Program.Instruction at(int i) {
        return program.instructions().get(i);
    }

    /** The product that a sum or difference takes in; -1 if it has none. */
    private int fused(int i) {
        Program.Instruction in = at(i);
        if (in.op() != Op.ADD && in.op() != Op.SUBTRACT) {
            return -1;
        }
        for (int k = in.operands() - 1; k >= 0; k--) {
            int o = in.operand(k);
            if (o >= program.invariants() && uses[o] == 1 && at(o).op() == Op.MULTIPLY) {
                return o;
            }
        }
        return -1;
    }

    /** Results that an operation takes, with those of a product that it takes in. */
    private int[] operands(int i) {
        Program.Instruction in = at(i);
        int product = fused(i);
        if (product < 0) {
            int[] own = new int[in.operands()];
            for (int k = 0; k < own.length; k++) {
                own[k] = in.operand(k);
            }
            return own;
        }
        int other = in.operand(0) == product ? in.operand(1) : in.operand(0);
        return new int[] {at(product).a(), at(product).b(), other};
    }

    private static boolean plain(Op op) {
        return switch (op) {
            case ADD, SUBTRACT, MULTIPLY, NEGATE, RECIPROCAL, RECIPROCAL_OR_ZERO, SQRT, ABS, MIN, MAX -> true;
            default -> false;
        };
    }

    private static boolean elementary(Op op) {
        return op == Op.EXP || op == Op.LOG || op == Op.SIN || op == Op.COS;
    }

    private static boolean leaf(Op op) {
        return op == Op.X || op == Op.Y || op == Op.Z || op == Op.CHART;
    }

    /** Whether a result is there before the first loop. */
    private boolean given(int i) {
        return i < program.invariants() || leaf(at(i).op());
    }

    /** Puts the operations into steps: runs of plain ones, elementary functions, and others, each as soon as it can be. */
    private List<List<Integer>> schedule() {
        List<List<Integer>> steps = new ArrayList<>();
        List<Integer> waiting = new ArrayList<>();
        for (int i = program.invariants(); i < program.size(); i++) {
            if (!leaf(at(i).op()) && !absorbed[i]) {
                waiting.add(i);
            }
        }
        while (!waiting.isEmpty()) {
            List<Integer> chosen = new ArrayList<>();
            for (int i : waiting) {
                if (plain(at(i).op()) && chosen.size() < LONGEST && ready(i, steps.size())) {
                    chosen.add(i);
                    step[i] = steps.size();
                }
            }
            if (chosen.isEmpty()) {
                int first = waiting.stream()
                        .filter(i -> ready(i, -1))
                        .findFirst()
                        .orElseThrow(() -> new IllegalStateException("operations wait for each other"));
                step[first] = steps.size();
                chosen.add(first);
            }
            waiting.removeAll(chosen);
            steps.add(chosen);
        }
        for (int i = program.invariants(); i < program.size(); i++) {
            if (step[i] >= 0) {
                for (int o : operands(i)) {
                    lastStep[o] = Math.max(lastStep[o], step[i]);
                }
            }
        }
        return steps;
    }

    /** Whether all operands are there at the beginning of a step, or earlier in the step {@code within} itself. */
    private boolean ready(int i, int within) {
        for (int o : operands(i)) {
            boolean there = given(o) || (step[o] >= 0 && (within < 0 || step[o] <= within));
            if (!there) {
                return false;
            }
        }
        return true;
    }

    private byte[] translate() {
        invariants();
        List<List<Integer>> steps = schedule();
        for (int s = 0; s < steps.size(); s++) {
            List<Integer> chosen = steps.get(s);
            // a row is given back after the loop that reads it, so that a loop never writes what it reads
            for (int i : chosen) {
                if (uses[i] > 0 && (lastStep[i] > s || elementary(at(i).op()))) {
                    row[i] = freeRows.isEmpty() ? rows++ : freeRows.pop();
                }
            }
            if (elementary(at(chosen.get(0)).op())) {
                function(s, chosen.get(0));
            } else {
                new Loop(s, chosen).write();
            }
            for (int i = program.invariants(); i < program.size(); i++) {
                if (row[i] >= 0 && lastStep[i] <= s) {
                    freeRows.push(row[i]);
                    row[i] = -1;
                }
            }
        }
        MethodVisitor run = target.begin(Opcodes.ACC_PUBLIC, "run");
        target.call(run, "invariants", KernelClass.COUNT);
        for (int s = 0; s < steps.size(); s++) {
            target.call(run, "step" + s, KernelClass.COUNT);
        }
        target.call(run, "given", KernelClass.COUNT);
        KernelClass.end(run);
        givenOutputs();
        return target.file();
    }

    /** Computes what does not depend on the place into its cells. */
    private void invariants() {
        MethodVisitor code = target.begin(Opcodes.ACC_PRIVATE, "invariants");
        for (int i = 0; i < program.invariants(); i++) {
            Program.Instruction in = at(i);
            if (in.op() == Op.CONSTANT) {
                continue;
            }
            code.visitVarInsn(Opcodes.ALOAD, CELLS);
            Compiler.push(code, i);
            if (in.op() == Op.ARGUMENT) {
                code.visitVarInsn(Opcodes.ALOAD, KernelClass.ARGUMENTS);
                Compiler.push(code, in.index());
                code.visitInsn(Opcodes.DALOAD);
            } else if (in.op() == Op.WAVELENGTH) {
                code.visitVarInsn(Opcodes.DLOAD, KernelClass.WAVELENGTH);
            } else {
                Compiler.operate(code, in, o -> cell(code, o));
            }
            code.visitInsn(Opcodes.DASTORE);
        }
        KernelClass.end(code);
    }

    private void cell(MethodVisitor code, int o) {
        if (at(o).op() == Op.CONSTANT) {
            Compiler.number(code, at(o).value());
            return;
        }
        code.visitVarInsn(Opcodes.ALOAD, CELLS);
        Compiler.push(code, o);
        code.visitInsn(Opcodes.DALOAD);
    }

    /** An elementary function of a row into another; outputs are copied from it. */
    private void function(int s, int i) {
        Program.Instruction in = at(i);
        MethodVisitor code = target.begin(Opcodes.ACC_PRIVATE, "step" + s);
        array(code, in.a());
        code.visitVarInsn(Opcodes.ILOAD, KernelClass.COUNT);
        rowArray(code, row[i]);
        rowArray(code, 0);
        rowArray(code, 1);
        code.visitMethodInsn(
                Opcodes.INVOKESTATIC, ELEMENTARY, in.op().name().toLowerCase(Locale.ROOT), "([DI[D[D[D)V", false);
        for (int k = 0; k < program.outputs().size(); k++) {
            if (program.outputs().get(k) == i) {
                rowArray(code, row[i]);
                copyToOutput(code, k);
            }
        }
        KernelClass.end(code);
    }

    /** Copies the array on the stack to an output. */
    private void copyToOutput(MethodVisitor code, int output) {
        code.visitInsn(Opcodes.ICONST_0);
        outArray(code, output);
        code.visitInsn(Opcodes.ICONST_0);
        code.visitVarInsn(Opcodes.ILOAD, KernelClass.COUNT);
        code.visitMethodInsn(
                Opcodes.INVOKESTATIC,
                Type.getInternalName(System.class),
                "arraycopy",
                "(Ljava/lang/Object;ILjava/lang/Object;II)V",
                false);
    }

    /** Outputs that are invariants or coordinates. */
    private void givenOutputs() {
        MethodVisitor code = target.begin(Opcodes.ACC_PRIVATE, "given");
        for (int k = 0; k < program.outputs().size(); k++) {
            int o = program.outputs().get(k);
            if (o < program.invariants()) {
                outArray(code, k);
                code.visitInsn(Opcodes.ICONST_0);
                code.visitVarInsn(Opcodes.ILOAD, KernelClass.COUNT);
                cell(code, o);
                code.visitMethodInsn(Opcodes.INVOKESTATIC, ARRAYS, "fill", "([DIID)V", false);
            } else if (leaf(at(o).op())) {
                array(code, o);
                copyToOutput(code, k);
            }
        }
        KernelClass.end(code);
    }

    private static void outArray(MethodVisitor code, int output) {
        code.visitVarInsn(Opcodes.ALOAD, KernelClass.OUT);
        KernelClass.component(code, output);
    }

    private static void rowArray(MethodVisitor code, int number) {
        code.visitVarInsn(Opcodes.ALOAD, ROWS);
        Compiler.push(code, number);
        code.visitInsn(Opcodes.AALOAD);
    }

    /** The array that holds a result which depends on the place. */
    private void array(MethodVisitor code, int o) {
        Program.Instruction in = at(o);
        switch (in.op()) {
            case X -> code.visitVarInsn(Opcodes.ALOAD, KernelClass.X);
            case Y -> code.visitVarInsn(Opcodes.ALOAD, KernelClass.Y);
            case Z -> code.visitVarInsn(Opcodes.ALOAD, KernelClass.Z);
            case CHART -> {
                KernelClass.chart(code, in.index());
            }
            default -> rowArray(code, row[o]);
        }
    }

    /** Writes one loop. Mutable, for one method. */
    private final class Loop {
        private final MethodVisitor code;
        private final List<Integer> chosen;
        private final int number;
        /** Locals of arrays and of invariants that are read, and of results. */
        private final Map<Integer, Integer> locals = new LinkedHashMap<>();

        private final List<Object> types = target.frame();
        private int next = target.firstFree();

        Loop(int number, List<Integer> chosen) {
            this.number = number;
            this.chosen = chosen;
            this.code = target.begin(Opcodes.ACC_PRIVATE, "step" + number);
        }

        void write() {
            Map<Integer, Integer> outputs = new LinkedHashMap<>();
            Map<Integer, Integer> stores = new LinkedHashMap<>();
            for (int i : chosen) {
                for (int o : operands(i)) {
                    prepare(o);
                }
                if (row[i] >= 0) {
                    rowArray(code, row[i]);
                    stores.put(i, arrayLocal());
                }
            }
            for (int k = 0; k < program.outputs().size(); k++) {
                if (chosen.contains(program.outputs().get(k))) {
                    outArray(code, k);
                    outputs.put(k, arrayLocal());
                }
            }
            int point = next++;
            types.add(Opcodes.INTEGER);
            code.visitInsn(Opcodes.ICONST_0);
            code.visitVarInsn(Opcodes.ISTORE, point);
            Label head = new Label();
            Label exit = new Label();
            Object[] frame = types.toArray();
            code.visitLabel(head);
            code.visitFrame(Opcodes.F_FULL, frame.length, frame, 0, new Object[0]);
            code.visitVarInsn(Opcodes.ILOAD, point);
            code.visitVarInsn(Opcodes.ILOAD, KernelClass.COUNT);
            code.visitJumpInsn(Opcodes.IF_ICMPGE, exit);
            for (int i : chosen) {
                compute(i, point);
                int local = next;
                next += 2;
                code.visitVarInsn(Opcodes.DSTORE, local);
                locals.put(i, local);
                Integer store = stores.get(i);
                if (store != null) {
                    store(store, point, local);
                }
                outputs.forEach((k, array) -> {
                    if (program.outputs().get(k) == i) {
                        store(array, point, local);
                    }
                });
            }
            code.visitIincInsn(point, 1);
            code.visitJumpInsn(Opcodes.GOTO, head);
            code.visitLabel(exit);
            code.visitFrame(Opcodes.F_FULL, frame.length, frame, 0, new Object[0]);
            KernelClass.end(code);
        }

        private void store(int array, int point, int local) {
            code.visitVarInsn(Opcodes.ALOAD, array);
            code.visitVarInsn(Opcodes.ILOAD, point);
            code.visitVarInsn(Opcodes.DLOAD, local);
            code.visitInsn(Opcodes.DASTORE);
        }

        private int arrayLocal() {
            code.visitVarInsn(Opcodes.ASTORE, next);
            types.add("[D");
            return next++;
        }

        /** Brings the array or the invariant of an operand into a local before the loop. */
        private void prepare(int o) {
            if (at(o).op() == Op.CONSTANT || locals.containsKey(o) || step[o] == number) {
                return;
            }
            if (o < program.invariants()) {
                cell(code, o);
                code.visitVarInsn(Opcodes.DSTORE, next);
                types.add(Opcodes.DOUBLE);
                locals.put(o, next);
                next += 2;
            } else {
                array(code, o);
                locals.put(o, arrayLocal());
            }
        }

        private void load(int o, int point) {
            Program.Instruction in = at(o);
            if (in.op() == Op.CONSTANT) {
                Compiler.number(code, in.value());
                return;
            }
            Integer local = locals.get(o);
            if (local == null) {
                throw new IllegalStateException("operation " + o + " is used before it is computed");
            }
            if (o < program.invariants() || step[o] == number) {
                code.visitVarInsn(Opcodes.DLOAD, local);
            } else {
                code.visitVarInsn(Opcodes.ALOAD, local);
                code.visitVarInsn(Opcodes.ILOAD, point);
                code.visitInsn(Opcodes.DALOAD);
            }
        }

        private void compute(int i, int point) {
            Program.Instruction in = at(i);
            int product = fused(i);
            if (product >= 0) {
                int other = in.a() == product ? in.b() : in.a();
                load(at(product).a(), point);
                if (in.op() == Op.SUBTRACT && in.b() == product) {
                    code.visitInsn(Opcodes.DNEG);
                }
                load(at(product).b(), point);
                load(other, point);
                if (in.op() == Op.SUBTRACT && in.a() == product) {
                    code.visitInsn(Opcodes.DNEG);
                }
                code.visitMethodInsn(Opcodes.INVOKESTATIC, Type.getInternalName(Math.class), "fma", "(DDD)D", false);
            } else if (in.op() == Op.RECIPROCAL_OR_ZERO) {
                // 0 at 0 without a branch: a over its square, which is kept from 0 by what else is lost in it
                load(in.a(), point);
                load(in.a(), point);
                load(in.a(), point);
                code.visitInsn(Opcodes.DMUL);
                Compiler.number(code, Double.MIN_NORMAL);
                code.visitMethodInsn(Opcodes.INVOKESTATIC, Type.getInternalName(Math.class), "max", "(DD)D", false);
                code.visitInsn(Opcodes.DDIV);
            } else {
                Compiler.operate(code, in, o -> load(o, point));
            }
        }
    }
}
