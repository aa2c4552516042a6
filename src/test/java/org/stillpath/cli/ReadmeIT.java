package org.stillpath.cli;

import static org.assertj.core.api.Assertions.assertThat;

import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** What README.md shows is what happens. */
class ReadmeIT {
    private static final Path PROJECT = Path.of("").toAbsolutePath();
    private static final Pattern BLOCK = Pattern.compile("```(\\w+)\\n(.*?)```", Pattern.DOTALL);

    @TempDir
    Path folder;

    private static List<String> blocks(String language) throws Exception {
        String text = Files.readString(PROJECT.resolve("README.md"), StandardCharsets.UTF_8);
        List<String> found = new ArrayList<>();
        Matcher m = BLOCK.matcher(text);
        while (m.find()) {
            if (language.equals(m.group(1))) {
                found.add(m.group(2));
            }
        }
        return found;
    }

    @Test
    void theMainCommandPrintsWhatIsShown() throws Exception {
        String command = blocks("sh").get(0).strip();
        assertThat(command).endsWith("target/stillpath run media-models/demo/rod.yaml --out target/rod");
        Packaged.Ended end = Packaged.run(
                folder, "run", PROJECT.resolve("media-models/demo/rod.yaml").toString(), "--out", "rod");
        assertThat(end.status()).isZero();
        assertThat(end.out()).startsWith(blocks("text").get(0).stripTrailing());
        assertThat(folder.resolve("rod/rays.png")).isRegularFile();
    }

    @Test
    void theJobRunsAndItsSlipIsTold() throws Exception {
        String job = blocks("yaml").get(0);
        Files.writeString(folder.resolve("job.yaml"), job);
        assertThat(Packaged.run(folder, "run", "job.yaml").status()).isZero();
        assertThat(Packaged.run(folder, "run", "job.yaml", "--set", "media.rod.with.g=0.31 1/mm")
                        .status())
                .isZero();
        Files.writeString(folder.resolve("job.yaml"), job.replace("0.304 1/mm", "0.304 mmm"));
        Packaged.Ended end = Packaged.run(folder, "run", "job.yaml");
        assertThat(end.status()).isEqualTo(2);
        assertThat(end.err().strip()).isEqualTo(blocks("text").get(1).strip());
    }

    @Test
    void theBudgetPrintsWhatIsShown() throws Exception {
        Files.writeString(folder.resolve("budget.yaml"), blocks("yaml").get(1));
        // fewer samples than the standard asks for, for the time's sake; the yield then has other digits
        Packaged.Ended end = Packaged.run(folder, "run", "budget.yaml", "--set", "study.budget.samples=20000");
        assertThat(end.status()).isZero();
        String shown = blocks("text").get(2);
        assertThat(end.out()).startsWith(shown.substring(0, shown.indexOf("yield")));
    }

    @Test
    void theFurtherWaysInWork() throws Exception {
        for (String task : List.of("lens", "trace", "between")) {
            Packaged.Ended starter = Packaged.run(folder, "new", task);
            Files.writeString(folder.resolve(task + ".yaml"), starter.out());
            assertThat(Packaged.run(folder, "check", task + ".yaml").status()).isZero();
            assertThat(Packaged.run(folder, "run", task + ".yaml").status()).isZero();
        }
        assertThat(Packaged.run(folder, "media").out()).contains("rods/helical");
        assertThat(Packaged.run(folder, "media", "rods/helical").status()).isZero();
    }
}
