package org.stillpath.io;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.stillpath.task.Table;

class TableCsvTest {
    @Test
    void writesHeaderAndRowsWithCarriageReturns() {
        Table table = new Table("t", List.of("ray", "x [m]"), List.of(List.of("1", "-2.5E-7"), List.of("2", "0.1")));
        assertThat(TableCsv.toText(table)).isEqualTo("ray,x [m]\r\n1,-2.5E-7\r\n2,0.1\r\n");
    }

    /** RFC 4180, section 2, rules 6 and 7. */
    @Test
    void quotesSeparatorsLineBreaksAndQuotes() {
        Table table = new Table("t", List.of("a"), List.of(List.of("x, y"), List.of("say \"n\""), List.of("a\nb")));
        assertThat(TableCsv.toText(table)).isEqualTo("a\r\n\"x, y\"\r\n\"say \"\"n\"\"\"\r\n\"a\nb\"\r\n");
    }

    @Test
    void keepsSpreadsheetsFromReadingTextAsFormulas() {
        Table table = new Table(
                "t",
                List.of("a"),
                List.of(List.of("=1+1"), List.of("+a"), List.of("-x"), List.of("@sum"), List.of("\tx"), List.of("-1")));
        assertThat(TableCsv.toText(table))
                .isEqualTo("a\r\n\"'=1+1\"\r\n\"'+a\"\r\n\"'-x\"\r\n\"'@sum\"\r\n\"'\tx\"\r\n-1\r\n");
    }
}
