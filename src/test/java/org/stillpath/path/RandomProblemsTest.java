package org.stillpath.path;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.within;

import java.util.ArrayList;
import java.util.List;
import java.util.Random;
import org.junit.jupiter.api.Test;
import org.stillpath.geometry.Vector;
import org.stillpath.ray.Columns;
import org.stillpath.ray.Ending;
import org.stillpath.ray.Fields;
import org.stillpath.ray.RayStart;
import org.stillpath.ray.Status;
import org.stillpath.ray.Traced;
import org.stillpath.ray.Tracer;
import org.stillpath.ray.Train;

/**
 * Seeded random two-point problems in smooth media of Gaussian bumps of either sign, in a plane and in space. The number of
 * images is odd (Burke, Astrophys. J. 244 (1981) L1), and Σ (−1)^index = 1, since the map from directions to a far plane has
 * degree 1 where nothing is cut off.
 *
 * <p>{@code -Dstillpath.problems=N} runs N problems instead of the usual few: ten thousand take some minutes.
 */
class RandomProblemsTest {
    private static final long SEED = 20261201L;
    private static final int PROBLEMS = Integer.getInteger("stillpath.problems", 150);
    /** One in so many is a problem in space. */
    private static final int IN_SPACE = 5;

    /** A problem: bumps between two points 12 apart. */
    private record Problem(Train train, Vector from, Vector to, boolean planar) {
        static Problem of(int number) {
            Random r = new Random(SEED + 7919L * number);
            boolean planar = number % IN_SPACE != 0;
            double[][] bumps = new double[1 + r.nextInt(4)][];
            for (int b = 0; b < bumps.length; b++) {
                bumps[b] = new double[] {
                    planar ? 0 : 1.5 * (r.nextDouble() - 0.5),
                    1.5 * (r.nextDouble() - 0.5),
                    2 + 8 * r.nextDouble(),
                    1.15 * r.nextDouble() - 0.25,
                    0.5 + r.nextDouble()
                };
            }
            Vector from = new Vector(planar ? 0 : 0.4 * r.nextDouble(), 0.4 * r.nextDouble(), 0);
            Vector to = new Vector(planar ? 0 : 0.4 * r.nextDouble(), 0.4 * r.nextDouble(), 12);
            return new Problem(Train.through(Fields.bumps(1.5, bumps)), from, to, planar);
        }

        PathSearch.Query query(boolean back) {
            return new PathSearch.Query(
                    train,
                    back ? to : from,
                    back ? from : to,
                    Vector.ZERO,
                    Math.toRadians(60),
                    planar ? new Vector(1, 0, 0) : Vector.ZERO,
                    1e-10);
        }
    }

    @Test
    void findsAnOddNumberOfPathsAndNoneTwice() {
        int images = 0;
        List<String> wrong = new ArrayList<>();
        for (int i = 0; i < PROBLEMS; i++) {
            Problem problem = Problem.of(i);
            PathSearch.Outcome there = PathSearch.run(problem.query(false));
            List<StationaryPath> paths = there.paths();
            images += paths.size();
            int sum = 0;
            boolean degenerate = false;
            for (int k = 0; k < paths.size(); k++) {
                StationaryPath p = paths.get(k);
                degenerate |= p.kind() == StationaryPath.Kind.DEGENERATE;
                sum += p.morseIndex() % 2 == 0 ? 1 : -1;
                assertThat(p.reducedIndex())
                        .as("index of path " + k + " of problem " + i)
                        .isEqualTo(p.morseIndex());
                for (int j = 0; j < k; j++) {
                    assertThat(paths.get(j).launch().minus(p.launch()).norm())
                            .as("two paths of problem " + i)
                            .isGreaterThan(1e-5);
                }
            }
            if (!degenerate && sum != 1) {
                wrong.add(i + (problem.planar ? " in a plane: " : " in space: ") + paths.size() + " paths, sum " + sum);
            }
        }
        System.out.println(PROBLEMS + " problems, " + images + " images; the count is off in " + wrong);
        assertThat(wrong).isEmpty();
        assertThat(images).isGreaterThan(PROBLEMS);
    }

    @Test
    void findsTheSamePathsBack() {
        for (int i = 0; i < PROBLEMS; i += 10) {
            Problem problem = Problem.of(i);
            List<StationaryPath> there = PathSearch.run(problem.query(false)).paths();
            List<StationaryPath> back = PathSearch.run(problem.query(true)).paths();
            assertThat(back).as("problem " + i).hasSameSizeAs(there);
            for (int k = 0; k < there.size(); k++) {
                assertThat(back.get(k).opticalLength()).isCloseTo(there.get(k).opticalLength(), within(1e-8));
                assertThat(back.get(k).morseIndex()).isEqualTo(there.get(k).morseIndex());
                assertThat(back.get(k).kind()).isEqualTo(there.get(k).kind());
            }
        }
    }

    /** A dense uniform scan of angles, with nothing but changes of sign, finds no image that the search has missed. */
    @Test
    void missesNothingThatADenseScanFinds() {
        int most = Math.min(200, PROBLEMS / 4);
        for (int i = 1, done = 0; done < most; i++) {
            Problem problem = Problem.of(i);
            if (!problem.planar) {
                continue;
            }
            done++;
            List<StationaryPath> paths = PathSearch.run(problem.query(false)).paths();
            List<Double> scanned = scan(problem);
            for (double angle : scanned) {
                assertThat(paths.stream().mapToDouble(p -> Math.abs(angle(problem, p.launch()) - angle)))
                        .as("problem " + i + ", the path at " + angle + " rad")
                        .anyMatch(d -> d < 2 * STEP);
            }
        }
    }

    private static final double STEP = Math.toRadians(0.02);

    private static Vector chord(Problem problem) {
        return problem.to.minus(problem.from).unit();
    }

    private static double angle(Problem problem, Vector launch) {
        Vector side = new Vector(1, 0, 0).cross(chord(problem));
        return Math.atan2(launch.dot(side), launch.dot(chord(problem)));
    }

    /** Angles between which the signed miss of the first passage changes sign without a jump. */
    private static List<Double> scan(Problem problem) {
        Tracer tracer = new Tracer(
                problem.train,
                new Ending.Nearest(problem.to, 1),
                new Tracer.Settings(1e-8, false, false, Columns.PLANES, 12));
        List<Double> found = new ArrayList<>();
        double before = Double.NaN;
        Vector chord = chord(problem);
        Vector side = new Vector(1, 0, 0).cross(chord);
        for (double a = -Math.toRadians(60); a <= Math.toRadians(60); a += STEP) {
            Vector d = chord.times(Math.cos(a)).plus(Math.sin(a), side);
            Traced t = tracer.glance(RayStart.of(problem.from, d), 1e-8);
            double miss = t.status() == Status.ARRIVED
                    ? t.position().minus(problem.to).dot(new Vector(1, 0, 0).cross(t.direction()))
                    : Double.NaN;
            if (before * miss < 0 && Math.abs(before - miss) < 0.5) {
                found.add(a - 0.5 * STEP);
            }
            before = miss;
        }
        return found;
    }
}
