package org.stillpath.job;

import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;

/**
 * What a job may name besides itself: shipped media and the user's own files. Implemented by the floor that reads files;
 * the engine never opens one itself.
 */
public interface Sources {
    /**
     * A YAML document: a shipped one by its name ({@code rods/parabolic}), or a file of the user's own ({@code
     * ./mine.yaml}).
     *
     * @param name as the job has it
     * @param asked where the job has it
     * @return the document's top mapping, its places naming that document
     * @throws org.stillpath.problem.ProblemException if there is no such document (near names are offered), it may not be
     *     read, or is not sound YAML
     */
    Node.Mapping document(String name, Place asked);

    /**
     * A CSV table.
     *
     * @param name path relative to the document that names it, as it stands there
     * @param asked where it stands
     * @return the table
     * @throws org.stillpath.problem.ProblemException if it may not be read or is not a sound table
     */
    Table table(String name, Place asked);

    /**
     * A CSV table whose cells are left as they are.
     *
     * @param name path relative to the document that names it, as it stands there
     * @param asked where it stands
     * @return the cells with their places
     * @throws org.stillpath.problem.ProblemException if it may not be read or has no sound header
     */
    Cells cells(String name, Place asked);

    /**
     * Nodes of a rectilinear grid with a value each: a CSV table of x, y, z and a value, or a VTK file.
     *
     * @param name path relative to the document that names it, as it stands there
     * @param wanted what of the file is taken
     * @param asked where it stands
     * @return the nodes, in the units of the file
     * @throws org.stillpath.problem.ProblemException if it may not be read, or does not hold such a grid
     */
    Lattice lattice(String name, Lattice.Wanted wanted, Place asked);

    /**
     * One ascent of a radiosonde from a file in the layout of the archive IGRA, version 2.
     *
     * @param name path relative to the document that names it, as it stands there
     * @param wanted which of its soundings is taken
     * @param asked where it stands
     * @return the sounding, in SI
     * @throws org.stillpath.problem.ProblemException if it may not be read, is not in that layout, or none or several of its
     *     soundings fit
     */
    default Sounding sounding(String name, Sounding.Wanted wanted, Place asked) {
        throw new ProblemException(
                Problem.input(asked, "", "\"" + name + "\" cannot be read: no soundings are at hand here"));
    }

    /** Sources for callers without files: whatever is asked for is a fault that says so. */
    static Sources none() {
        return NoSources.INSTANCE;
    }
}
