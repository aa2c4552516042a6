package org.stillpath.problem;

/**
 * One fault of a user's input or surroundings.
 *
 * @param kind what sort of fault, which decides the exit status
 * @param place where in the input it stands
 * @param path path of the value in the job tree, such as {@code media.rod.with.g}; empty where there is none
 * @param message what is wrong with which value, what was expected, and the remedy; one line, no stack trace
 */
public record Problem(Kind kind, Place place, String path, String message) {

    /** The sorts of fault, by exit status of the command line. */
    public enum Kind {
        /** The input is wrong. */
        INPUT(2),
        /** The computation could not reach the asked accuracy. */
        ACCURACY(3),
        /** A file could not be read or written. */
        FILE(4);

        private final int exitStatus;

        Kind(int exitStatus) {
            this.exitStatus = exitStatus;
        }

        /** Exit status that the command line ends with for this sort of fault. */
        public int exitStatus() {
            return exitStatus;
        }
    }

    /** A fault of the input. */
    public static Problem input(Place place, String path, String message) {
        return new Problem(Kind.INPUT, place, path, message);
    }

    /** A file that could not be read or written. */
    public static Problem file(Place place, String message) {
        return new Problem(Kind.FILE, place, "", message);
    }

    /** {@code job.yaml:12:8: media.rod.with.g: message}. */
    @Override
    public String toString() {
        return place + ": " + (path.isEmpty() ? "" : path + ": ") + message;
    }
}
