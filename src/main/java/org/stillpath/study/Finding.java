package org.stillpath.study;

import java.util.List;
import org.stillpath.task.Figure;

/**
 * What one study found.
 *
 * @param key its key in {@code study:}
 * @param headline the answer as a sentence
 * @param doc its part of the result document
 * @param listings tables
 * @param figures figures as data
 * @param warnings what makes it doubtful
 * @param accurate whether every run that counts reached the asked accuracy
 */
public record Finding(
        String key,
        String headline,
        Doc doc,
        List<Listing> listings,
        List<Figure> figures,
        List<String> warnings,
        boolean accurate) {
    public Finding {
        listings = List.copyOf(listings);
        figures = List.copyOf(figures);
        warnings = List.copyOf(warnings);
    }
}
