package org.stillpath.study;

import org.stillpath.job.Value;

final class BudgetStudy implements Study {
    @Override
    public String key() {
        return "budget";
    }

    @Override
    public Plan read(Value value, Desk desk) {
        throw new UnsupportedOperationException();
    }
}
