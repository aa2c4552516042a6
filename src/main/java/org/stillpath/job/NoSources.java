package org.stillpath.job;

import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;

/** Refuses every name; for library users who give media as objects. */
enum NoSources implements Sources {
    INSTANCE;

    @Override
    public Node.Mapping document(String name, Place asked) {
        throw new ProblemException(
                Problem.input(asked, "", "\"" + name + "\" cannot be read: no files are at hand here"));
    }

    @Override
    public Table table(String name, Place asked) {
        throw new ProblemException(
                Problem.input(asked, "", "\"" + name + "\" cannot be read: no files are at hand here"));
    }

    @Override
    public Cells cells(String name, Place asked) {
        throw new ProblemException(
                Problem.input(asked, "", "\"" + name + "\" cannot be read: no files are at hand here"));
    }

    @Override
    public Lattice lattice(String name, Lattice.Wanted wanted, Place asked) {
        throw new ProblemException(
                Problem.input(asked, "", "\"" + name + "\" cannot be read: no files are at hand here"));
    }
}
