package org.stillpath.formula;

import java.util.ArrayList;
import java.util.Collections;
import java.util.HashMap;
import java.util.LinkedHashSet;
import java.util.List;
import java.util.Map;
import java.util.Set;

/**
 * A graph's nodes as plain operations in the order of their computation, products multiplied out: what the evaluator
 * walks and the compiler translates. Equal operations are one. The first {@code invariants} of them do not depend on the
 * place and are computed once a call.
 *
 * @param instructions the operations, each behind its operands
 * @param invariants how many of them, from the first on, do not depend on the place
 * @param outputs operations whose results are the value, the gradient and the Hessian, as far as asked for
 * @param charts charted coordinates that are used
 */
record Program(List<Instruction> instructions, int invariants, List<Integer> outputs, Set<Coordinate> charts) {
    /** Whole powers up to this are multiplied out. */
    private static final int LARGEST_LADDER = 64;

    Program {
        instructions = List.copyOf(instructions);
        outputs = List.copyOf(outputs);
        charts = Collections.unmodifiableSet(new LinkedHashSet<>(charts));
    }

    /**
     * One operation.
     *
     * @param op not one of those that stand in graphs only
     * @param value of a constant
     * @param index of an argument or chart component
     * @param a first operand; operands that an operation lacks are 0
     * @param b second operand
     * @param c third operand
     * @param d fourth operand
     * @param place whether it depends on the place
     */
    record Instruction(Op op, double value, int index, int a, int b, int c, int d, boolean place) {
        /** How many operands it has. */
        int operands() {
            return switch (op) {
                case CONSTANT, ARGUMENT, WAVELENGTH, X, Y, Z, CHART -> 0;
                case ADD, SUBTRACT, MULTIPLY, POWER, ATAN2, MIN, MAX -> 2;
                case UNLESS_ZERO -> 3;
                case IF_LESS -> 4;
                default -> 1;
            };
        }

        int operand(int i) {
            return switch (i) {
                case 0 -> a;
                case 1 -> b;
                case 2 -> c;
                default -> d;
            };
        }
    }

    /** Lowers the nodes that are needed for the outputs. */
    static Program from(Graph graph, List<Integer> outputs) {
        return new Lowering(graph).run(outputs);
    }

    int size() {
        return instructions.size();
    }

    /** Translates a graph; mutable, for one use. */
    private static final class Lowering {
        private final Graph graph;
        private final List<Instruction> list = new ArrayList<>();
        private final Map<Instruction, Integer> ids = new HashMap<>();

        Lowering(Graph graph) {
            this.graph = graph;
        }

        Program run(List<Integer> outputs) {
            int top = Collections.max(outputs);
            boolean[] used = new boolean[top + 1];
            for (int o : outputs) {
                used[o] = true;
            }
            for (int id = top; id >= 0; id--) {
                if (used[id]) {
                    for (int o : graph.node(id).operands()) {
                        used[o] = true;
                    }
                }
            }
            int[] lowered = new int[top + 1];
            for (int id = 0; id <= top; id++) {
                if (used[id]) {
                    lowered[id] = lower(graph.node(id), lowered);
                }
            }
            List<Integer> results = outputs.stream().map(o -> lowered[o]).toList();
            return sorted(results);
        }

        /** Drops what only unused intermediate steps needed, and moves what does not depend on the place to the front. */
        private Program sorted(List<Integer> outputs) {
            boolean[] used = new boolean[list.size()];
            for (int o : outputs) {
                used[o] = true;
            }
            for (int i = list.size() - 1; i >= 0; i--) {
                Instruction in = list.get(i);
                for (int k = 0; used[i] && k < in.operands(); k++) {
                    used[in.operand(k)] = true;
                }
            }
            int[] moved = new int[list.size()];
            List<Instruction> result = new ArrayList<>();
            Set<Coordinate> charts = new LinkedHashSet<>();
            int invariants = 0;
            for (boolean place : new boolean[] {false, true}) {
                for (int i = 0; i < list.size(); i++) {
                    Instruction in = list.get(i);
                    if (used[i] && in.place() == place) {
                        moved[i] = result.size();
                        int n = in.operands();
                        result.add(new Instruction(
                                in.op(),
                                in.value(),
                                in.index(),
                                n > 0 ? moved[in.a()] : 0,
                                n > 1 ? moved[in.b()] : 0,
                                n > 2 ? moved[in.c()] : 0,
                                n > 3 ? moved[in.d()] : 0,
                                place));
                        if (in.op() == Op.CHART) {
                            charts.add(Coordinate.CHARTED.get(in.index() / 10));
                        }
                    }
                }
                invariants = place ? invariants : result.size();
            }
            return new Program(
                    result, invariants, outputs.stream().map(o -> moved[o]).toList(), charts);
        }

        private int leaf(Op op, double value, int index) {
            return emit(op, value, index, new int[0]);
        }

        private int emit(Op op, int... operands) {
            return emit(op, 0, 0, operands);
        }

        private int emit(Op op, double value, int index, int[] operands) {
            boolean place = op == Op.X || op == Op.Y || op == Op.Z || op == Op.CHART;
            int[] o = new int[4];
            for (int i = 0; i < operands.length; i++) {
                o[i] = operands[i];
                place |= list.get(operands[i]).place();
            }
            if ((op == Op.ADD || op == Op.MULTIPLY) && o[0] > o[1]) {
                int swap = o[0];
                o[0] = o[1];
                o[1] = swap;
            }
            return ids.computeIfAbsent(new Instruction(op, value, index, o[0], o[1], o[2], o[3], place), in -> {
                list.add(in);
                return list.size() - 1;
            });
        }

        private int lower(Graph.Node node, int[] lowered) {
            return switch (node.op()) {
                case CONSTANT, ARGUMENT, WAVELENGTH, X, Y, Z, CHART -> leaf(node.op(), node.value(), node.index());
                case SQUARE_R -> squareR();
                case SQUARE_RHO -> {
                    int z = emit(Op.Z);
                    yield emit(Op.ADD, squareR(), emit(Op.MULTIPLY, z, z));
                }
                case NORM -> emit(Op.SQRT, lowered[node.operand(0)]);
                case ADD -> sum(node.operand(0), node.operand(1), lowered);
                case SCALE ->
                    isNegation(node)
                            ? emit(Op.NEGATE, lowered[node.operand(1)])
                            : emit(Op.MULTIPLY, lowered[node.operand(0)], lowered[node.operand(1)]);
                case TIMES -> emit(Op.MULTIPLY, lowered[node.operand(0)], lowered[node.operand(1)]);
                case PRODUCT -> product(node, lowered);
                default -> {
                    int[] operands = new int[node.operands().size()];
                    for (int i = 0; i < operands.length; i++) {
                        operands[i] = lowered[node.operand(i)];
                    }
                    yield emit(node.op(), operands);
                }
            };
        }

        private int squareR() {
            int x = emit(Op.X);
            int y = emit(Op.Y);
            return emit(Op.ADD, emit(Op.MULTIPLY, x, x), emit(Op.MULTIPLY, y, y));
        }

        private boolean isNegation(Graph.Node node) {
            return node.op() == Op.SCALE && node.operand(0) == graph.minusOne;
        }

        private int sum(int a, int b, int[] lowered) {
            if (isNegation(graph.node(b))) {
                return emit(Op.SUBTRACT, lowered[a], lowered[graph.node(b).operand(1)]);
            }
            if (isNegation(graph.node(a))) {
                return emit(Op.SUBTRACT, lowered[b], lowered[graph.node(a).operand(1)]);
            }
            return emit(Op.ADD, lowered[a], lowered[b]);
        }

        private int product(Graph.Node node, int[] lowered) {
            int result = -1;
            for (int i = 0; i < node.operands().size(); i++) {
                int base = lowered[node.operand(i)];
                int exponent = node.exponents().get(i);
                int factor;
                if (Math.abs(exponent) > LARGEST_LADDER) {
                    factor = emit(Op.POWER, base, leaf(Op.CONSTANT, exponent, 0));
                } else {
                    factor = ladder(exponent < 0 ? emit(Op.RECIPROCAL, base) : base, Math.abs(exponent));
                }
                result = result < 0 ? factor : emit(Op.MULTIPLY, result, factor);
            }
            return result;
        }

        /** A whole power by squaring, so that b⁴ uses b² and both are shared. */
        private int ladder(int base, int exponent) {
            if (exponent == 1) {
                return base;
            }
            int half = ladder(base, exponent / 2);
            int even = emit(Op.MULTIPLY, half, half);
            return exponent % 2 == 0 ? even : emit(Op.MULTIPLY, even, base);
        }
    }
}
