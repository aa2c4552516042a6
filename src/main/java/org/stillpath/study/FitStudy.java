package org.stillpath.study;

import org.stillpath.job.Value;

final class FitStudy implements Study {
    @Override
    public String key() {
        return "fit";
    }

    @Override
    public Plan read(Value value, Desk desk) {
        throw new UnsupportedOperationException();
    }
}
