package org.stillpath.plot;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import org.stillpath.task.Figure;

/** Draws every scene into a folder: run as a process of its own by a test, and by hand to look at the pictures. */
final class DrawAll {
    private DrawAll() {}

    public static void main(String[] args) throws IOException {
        Path folder = Path.of(args[0]);
        Files.createDirectories(folder);
        int number = 0;
        for (Figure figure : Scenes.figures()) {
            for (Width width : Width.values()) {
                Picture picture = Pictures.of(figure, width);
                String stem = number + "-" + figure.name() + "-" + (int) width.millimetres();
                Files.write(folder.resolve(stem + ".png"), picture.png());
                Files.write(folder.resolve(stem + ".svg"), picture.svg().getBytes(StandardCharsets.UTF_8));
            }
            number++;
        }
    }
}
