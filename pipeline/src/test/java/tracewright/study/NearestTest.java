package tracewright.study;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.List;
import java.util.Optional;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

@DisplayNameGeneration(ReplaceUnderscores.class)
@Tag("message")
class NearestTest {

    private static final List<String> WORDS = List.of("flavors", "scheme", "scale_gev", "gamma_m");

    @ParameterizedTest
    @CsvSource({"flavours, flavors", "FLAVORS, flavors", "shceme, scheme", "scale, scale_gev", "gama-m, gamma_m"})
    void given_a_slip_when_asked_then_the_word_meant_is_found(String word, String meant) {
        assertEquals(Optional.of(meant), Nearest.to(word, WORDS));
    }

    @ParameterizedTest
    @CsvSource({"x", "temperature", "''"})
    void given_a_word_unlike_all_when_asked_then_nothing_is_guessed_but_the_valid_ones_are_listed(String word) {
        assertEquals(Optional.empty(), Nearest.to(word, WORDS));
        assertEquals("valid: flavors, scheme, scale_gev, gamma_m", Nearest.advice(word, WORDS));
    }

    @Test
    void given_two_words_equally_near_when_asked_then_the_first_is_taken() {
        assertEquals(Optional.of("t1"), Nearest.to("t", List.of("t1", "t2")));
    }

    @Test
    void given_no_candidates_when_asked_then_that_is_said() {
        assertEquals("nothing is defined that could stand here", Nearest.advice("pion", List.of()));
    }
}
