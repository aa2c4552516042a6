package org.stillpath.unit;

import static org.assertj.core.api.Assertions.assertThat;

import java.math.BigDecimal;
import java.util.ArrayList;
import java.util.List;
import org.apache.commons.rng.UniformRandomProvider;
import org.apache.commons.rng.simple.RandomSource;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

class DecimalTest {
    @Test
    void everyNumberIsTheNearestDouble() {
        UniformRandomProvider rng = RandomSource.XO_RO_SHI_RO_128_PP.create(20261201L);
        List<String> texts = new ArrayList<>();
        for (int i = 0; i < 200_000; i++) {
            int digits = 1 + rng.nextInt(20);
            StringBuilder b = new StringBuilder(rng.nextBoolean() ? "-" : "");
            int point = rng.nextInt(digits + 1);
            for (int k = 0; k < digits; k++) {
                b.append(k == point ? "." : "").append((char) ('0' + rng.nextInt(10)));
            }
            if (rng.nextInt(3) == 0) {
                b.append('e').append(rng.nextInt(60) - 30);
            }
            texts.add(b.toString());
        }
        assertThat(wrong(texts)).isEmpty();
    }

    @Test
    void doublesComeBackAndTheirMiddlesRoundToEven() {
        UniformRandomProvider rng = RandomSource.XO_RO_SHI_RO_128_PP.create(20261202L);
        List<String> texts = new ArrayList<>();
        for (int i = 0; i < 100_000; i++) {
            texts.add(Double.toString((rng.nextDouble() - 0.5) * Math.pow(10, rng.nextInt(12) - 6)));
        }
        for (long odd = (1L << 53) + 1; odd < (1L << 53) + 4001; odd += 2) {
            // the middle between two doubles, exactly; and numbers as long
            texts.add(Long.toString(odd));
            texts.add(BigDecimal.valueOf(odd, 3).toString());
        }
        for (int power = 53; power < 59; power++) {
            // the spacing of doubles changes at a power of two
            for (long near = (1L << power) - 70; near < (1L << power) + 70; near++) {
                texts.add(Long.toString(near));
            }
        }
        assertThat(wrong(texts)).isEmpty();
    }

    /** Those whose number is not that of Double.parseDouble of the JDK, the oracle, which rounds correctly. */
    private static List<String> wrong(List<String> texts) {
        List<String> wrong = new ArrayList<>();
        for (String text : texts) {
            double read = Decimal.parse("a" + text + ";", 1, 1 + text.length());
            if (Double.compare(read, Double.parseDouble(text)) != 0) {
                wrong.add(text);
            }
        }
        return wrong;
    }

    @ParameterizedTest
    @ValueSource(
            strings = {
                "", "-", ".", "-.", "e5", "1e", "1e+", "1e5.0", "1 ", " 1", "1..2", "1.2.3", "0x1p3", "5d", "NaN",
                "inf", "1e999", "--1", "1-", "1,5"
            })
    void whatIsNoNumber(String text) {
        assertThat(Decimal.parse(text, 0, text.length())).isNaN();
        assertThat(Decimal.parse(text)).isEmpty();
    }

    @Test
    void signsAndZeros() {
        assertThat(Decimal.parse("\u22122.5").orElseThrow()).isEqualTo(-2.5);
        assertThat(Decimal.parse("+.5e1").orElseThrow()).isEqualTo(5);
        assertThat(Decimal.parse("-0").orElseThrow()).isEqualTo(-0.0);
        assertThat(Decimal.parse("1.").orElseThrow()).isEqualTo(1);
        assertThat(Decimal.parse("000000000000000000000000012").orElseThrow()).isEqualTo(12);
    }
}
