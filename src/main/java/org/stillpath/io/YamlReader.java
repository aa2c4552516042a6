package org.stillpath.io;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.Iterator;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.snakeyaml.engine.v2.api.LoadSettings;
import org.snakeyaml.engine.v2.api.lowlevel.Parse;
import org.snakeyaml.engine.v2.events.CollectionStartEvent;
import org.snakeyaml.engine.v2.events.Event;
import org.snakeyaml.engine.v2.events.NodeEvent;
import org.snakeyaml.engine.v2.events.ScalarEvent;
import org.snakeyaml.engine.v2.exceptions.Mark;
import org.snakeyaml.engine.v2.exceptions.MarkedYamlEngineException;
import org.snakeyaml.engine.v2.exceptions.ReaderException;
import org.snakeyaml.engine.v2.exceptions.YamlEngineException;
import org.stillpath.job.Node;
import org.stillpath.problem.Place;
import org.stillpath.problem.Problem;
import org.stillpath.problem.ProblemException;
import org.stillpath.problem.Problems;
import org.stillpath.problem.Words;

/**
 * YAML 1.2 text to a located tree, from the event stream of snakeyaml-engine. Events were chosen against binding
 * libraries because those lose the positions, and read {@code yes} and {@code 12:30} as something else than text; here
 * every scalar stays the text it is until somebody asks for a number.
 *
 * <p>One document a file; anchors, aliases and tags are refused, so that a tree is never larger than its text. Depth and
 * number of nodes have limits. Faults of meaning (a key twice, a parenthesis that a comma tore apart) are collected and
 * reading goes on; a fault of syntax ends it, because nothing sound follows.
 */
public final class YamlReader {
    /** Most bytes of a document. */
    static final int MOST_BYTES = 4 << 20;
    /** Deepest nesting of lists and sections. */
    static final int MOST_DEPTH = 60;
    /** Most values, lists and sections in a document. */
    static final int MOST_NODES = 200_000;

    private final Problems problems;
    private final String source;
    /** Where all nodes stand if the text has no lines of its own, as on the command line. */
    private final @Nullable Place only;

    private final Iterator<Event> events;
    private @Nullable Event ahead;
    private int nodes;

    private YamlReader(String text, String source, @Nullable Place only, Problems problems) {
        this.problems = problems;
        this.source = source;
        this.only = only;
        LoadSettings settings = LoadSettings.builder()
                .setLabel(source)
                .setCodePointLimit(MOST_BYTES)
                .setParseComments(false)
                .build();
        this.events = new Parse(settings).parseString(text).iterator();
    }

    /**
     * The top mapping of a document.
     *
     * @param bytes the document, UTF-8, with or without a byte-order mark
     * @param source its name, for places
     * @param problems collects the faults after which reading could go on
     * @throws ProblemException if it is empty, binary, not UTF-8, not sound YAML, not a mapping, or beyond a limit
     */
    public static Node.Mapping parse(byte[] bytes, String source, Problems problems) {
        if (bytes.length > MOST_BYTES) {
            throw fault(
                    Place.of(source), "", "the file is larger than the limit of file size, " + MOST_BYTES + " bytes");
        }
        String text = FileText.decode(bytes, source);
        if (text.startsWith("\ufeff")) {
            text = text.substring(1);
        }
        Node node = new YamlReader(text, source, null, problems).document();
        if (node instanceof Node.Mapping mapping) {
            return mapping;
        }
        String what = node instanceof Node.Scalar s ? Words.quoted(s.text()) + " stands" : "a list stands";
        throw fault(
                node.place(),
                "",
                what + " at the top of the file; keys with values are needed, such as \"task: lens\"");
    }

    /**
     * A value given apart from a file, such as {@code 0.31 1/mm} or {@code [1, 2]}; no text gives an empty scalar.
     *
     * @param text the value
     * @param place where all its nodes are said to stand
     * @param problems collects the faults after which reading could go on
     * @throws ProblemException if it is not sound YAML or beyond a limit
     */
    public static Node value(String text, Place place, Problems problems) {
        if (text.isBlank()) {
            return new Node.Scalar(place, "", false);
        }
        return new YamlReader(text, place.source(), place, problems).document();
    }

    private Node document() {
        try {
            next();
            Event start = peek();
            if (start.getEventId() == Event.ID.StreamEnd) {
                throw empty();
            }
            next();
            Node node = node("", 0);
            if (node instanceof Node.Scalar s && s.text().isEmpty() && !s.quoted()) {
                throw empty();
            }
            next();
            Event end = peek();
            if (end.getEventId() == Event.ID.DocumentStart) {
                throw fault(place(end), "", "a second document starts here; a file holds one");
            }
            return node;
        } catch (MarkedYamlEngineException e) {
            throw syntax(e);
        } catch (ReaderException e) {
            throw fault(
                    only == null ? Place.of(source) : only,
                    "",
                    String.format(Locale.ROOT, "character U+%04X may not stand in YAML", e.getCodePoint()));
        } catch (YamlEngineException e) {
            throw fault(
                    only == null ? Place.of(source) : only, "", "this is not sound YAML: " + oneLine(e.getMessage()));
        }
    }

    private ProblemException empty() {
        return fault(
                only == null ? new Place(source, 1, 1) : only,
                "",
                "the file is empty; keys with values are needed, such as \"task: lens\"");
    }

    private Node node(String path, int depth) {
        Event event = next();
        Place place = place(event);
        if (++nodes > MOST_NODES) {
            throw fault(place, path, "the limit of values in one file, " + MOST_NODES + ", is exceeded");
        }
        if (depth > MOST_DEPTH) {
            throw fault(place, path, "the limit of nesting, " + MOST_DEPTH + " levels, is exceeded");
        }
        switch (event.getEventId()) {
            case Alias ->
                problems.add(
                        place,
                        path,
                        "an alias, a name behind *, is not understood here; write the value out, or put it in"
                                + " quotes if the * belongs to it");
            case Scalar -> {
                ScalarEvent scalar = (ScalarEvent) event;
                refuseExtras(scalar, scalar.getTag(), place, path);
                String text = scalar.getValue();
                return new Node.Scalar(place, text, !scalar.isPlain());
            }
            case SequenceStart -> {
                CollectionStartEvent start = (CollectionStartEvent) event;
                refuseExtras(start, start.getTag(), place, path);
                return sequence(place, path, depth, start.isFlow());
            }
            case MappingStart -> {
                CollectionStartEvent start = (CollectionStartEvent) event;
                refuseExtras(start, start.getTag(), place, path);
                return mapping(place, path, depth, start.isFlow());
            }
            default -> throw new IllegalStateException("a node cannot start with " + event.getEventId());
        }
        return new Node.Scalar(place, "", true);
    }

    private void refuseExtras(NodeEvent event, Optional<String> tag, Place place, String path) {
        if (event.getAnchor().isPresent()) {
            problems.add(place, path, "an anchor, a name behind &, is not understood here; leave it out");
        }
        if (tag.isPresent()) {
            problems.add(place, path, "a tag, " + Words.quoted(tag.get()) + ", is not understood here; leave it out");
        }
    }

    private Node sequence(Place place, String path, int depth, boolean flow) {
        List<Node> items = new ArrayList<>();
        while (peek().getEventId() != Event.ID.SequenceEnd) {
            String itemPath = path + "[" + items.size() + "]";
            Node item = node(itemPath, depth + 1);
            if (flow && item instanceof Node.Scalar scalar && balance(scalar) != 0) {
                StringBuilder text = new StringBuilder(scalar.text());
                while (balance(text) > 0 && isPlain(peek())) {
                    text.append(", ").append(((ScalarEvent) next()).getValue());
                }
                item = torn(scalar, text.toString(), itemPath);
            }
            items.add(item);
        }
        next();
        return new Node.Sequence(place, items);
    }

    private Node mapping(Place place, String path, int depth, boolean flow) {
        List<Node.Entry> entries = new ArrayList<>();
        Map<String, Place> first = new HashMap<>();
        while (peek().getEventId() != Event.ID.MappingEnd) {
            Node keyNode = node(path, depth + 1);
            if (!(keyNode instanceof Node.Scalar key)) {
                problems.add(keyNode.place(), path, "a key must be a single word, not a list or a section");
                node(path, depth + 1);
                continue;
            }
            String valuePath = path.isEmpty() ? key.text() : path + "." + key.text();
            Node value = node(valuePath, depth + 1);
            if (flow && value instanceof Node.Scalar scalar && balance(scalar) != 0) {
                StringBuilder text = new StringBuilder(scalar.text());
                while (balance(text) > 0 && isPlain(peek())) {
                    ScalarEvent piece = (ScalarEvent) next();
                    text.append(", ").append(piece.getValue());
                    if (isPlain(peek()) && ((ScalarEvent) peek()).getValue().isEmpty()) {
                        next();
                    } else {
                        node(valuePath, depth + 1);
                        break;
                    }
                }
                value = torn(scalar, text.toString(), valuePath);
            }
            Place before = first.putIfAbsent(key.text(), key.place());
            if (before == null) {
                entries.add(new Node.Entry(key.text(), key.place(), value));
            } else {
                String where = before.line() == 0
                        ? ""
                        : "; the first is at line " + before.line() + ", column " + before.column();
                problems.add(key.place(), path, "key " + Words.quoted(key.text()) + " stands here twice" + where);
            }
        }
        next();
        return new Node.Mapping(place, entries);
    }

    /** Tells of a scalar that a comma tore apart, and puts it together so that nothing else is told of its pieces. */
    private Node torn(Node.Scalar start, String whole, String path) {
        String remedy = balance(whole) == 0
                ? "; within braces and brackets a formula with a comma is quoted: "
                        + Words.quoted(whole).replace('"', '\'')
                : balance(whole) > 0 ? "; a closing one is missing" : "; an opening one is missing";
        problems.add(start.place(), path, Words.quoted(start.text()) + " has an unbalanced parenthesis" + remedy);
        return new Node.Scalar(start.place(), whole, start.quoted());
    }

    private static int balance(Node.Scalar scalar) {
        return scalar.quoted() ? 0 : balance(scalar.text());
    }

    /** Opening less closing parentheses; negative as soon as one closes that was never opened. */
    private static int balance(CharSequence text) {
        int open = 0;
        for (int i = 0; i < text.length(); i++) {
            char c = text.charAt(i);
            open += c == '(' ? 1 : c == ')' ? -1 : 0;
            if (open < 0) {
                return -1;
            }
        }
        return open;
    }

    private static boolean isPlain(Event event) {
        return event instanceof ScalarEvent scalar && scalar.isPlain();
    }

    private Event peek() {
        Event event = ahead;
        if (event == null) {
            event = events.next();
            ahead = event;
        }
        return event;
    }

    private Event next() {
        Event event = peek();
        ahead = null;
        return event;
    }

    private Place place(Event event) {
        return place(event.getStartMark());
    }

    private Place place(Optional<Mark> mark) {
        if (only != null) {
            return only;
        }
        return mark.map(m -> new Place(source, m.getLine() + 1, m.getColumn() + 1))
                .orElse(Place.of(source));
    }

    private ProblemException syntax(MarkedYamlEngineException e) {
        String what = oneLine(e.getProblem());
        String remedy = "";
        if (what.contains("mapping values are not allowed")) {
            remedy =
                    "; a text with a colon and a blank in it needs quotes, and keys of one section stand in one column";
        } else if (what.contains("TAB") || what.contains("\\t")) {
            remedy = "; indent with blanks, not with tabs";
        } else if (what.contains("<block end>")) {
            remedy = "; look at the indentation of this line";
        } else if (what.contains("end of stream") || what.contains("stream end")) {
            remedy = e.getContextMark()
                    .filter(m -> only == null)
                    .map(m -> "; what is opened at line " + (m.getLine() + 1) + ", column " + (m.getColumn() + 1)
                            + " is not closed")
                    .orElse("; a quote, bracket or brace is not closed");
        } else if (what.contains("expected ','")) {
            remedy = "; look for a missing comma, or close what is opened"
                    + e.getContextMark()
                            .filter(m -> only == null)
                            .map(m -> " at line " + (m.getLine() + 1) + ", column " + (m.getColumn() + 1))
                            .orElse("");
        } else if (what.contains("cannot start any token")) {
            remedy = "; a text that starts with this character needs quotes";
        }
        String context = oneLine(e.getContext());
        return fault(
                place(e.getProblemMark().or(e::getContextMark)),
                "",
                "this is not sound YAML: " + (context.isEmpty() ? "" : context + ": ") + what + remedy);
    }

    private static String oneLine(@Nullable String message) {
        if (message == null) {
            return "";
        }
        String line = message.replace('\n', ' ').replace('\r', ' ').strip();
        return line.length() > 200 ? line.substring(0, 200) + "…" : line;
    }

    private static ProblemException fault(Place place, String path, String message) {
        return new ProblemException(Problem.input(place, path, message));
    }
}
