package org.stillpath.report;

/** Names of the result document as words for people. */
final class Labels {
    private Labels() {}

    /** {@code back-focal-distance} as {@code back focal distance}. */
    static String of(String key) {
        return key.replace('-', ' ');
    }
}
