package tracewright.analysis;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertSame;
import static org.junit.jupiter.api.Assertions.assertThrows;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.CountDownLatch;
import java.util.concurrent.TimeUnit;
import java.util.concurrent.atomic.AtomicInteger;
import java.util.stream.IntStream;
import org.junit.jupiter.api.DisplayNameGeneration;
import org.junit.jupiter.api.DisplayNameGenerator.ReplaceUnderscores;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.Timeout;
import tracewright.study.InputException;
import tracewright.study.Problem;

@Timeout(30)
@DisplayNameGeneration(ReplaceUnderscores.class)
class WorkersTest {

    private static <T> List<T> run(int threads, List<Callable<T>> units) {
        try (Workers workers = new Workers(threads)) {
            return workers.all(units);
        }
    }

    private static Callable<Integer> failing(InputException.Cause cause, String... problems) {
        return () -> {
            throw new InputException(cause, List.of(problems).stream().map(p -> new Problem(p, "there", "mend it")).toList());
        };
    }

    /** The first unit waits for the second: it must finish last and still come first. */
    @Tag("exact")
    @Test
    void given_units_that_finish_in_another_order_then_results_come_in_the_order_of_the_units() {
        CountDownLatch second = new CountDownLatch(1);
        List<Callable<String>> units = List.of(() -> {
            second.await(20, TimeUnit.SECONDS);
            return "first";
        }, () -> {
            second.countDown();
            return "second";
        });
        assertEquals(List.of("first", "second"), run(2, units));
    }

    @Tag("law")
    @Test
    void given_any_number_of_threads_then_results_are_the_same() {
        List<Callable<Integer>> units = new ArrayList<>();
        IntStream.range(0, 50).forEach(i -> units.add(() -> i * i));
        List<Integer> one = run(1, units);
        assertEquals(49 * 49, one.get(49));
        assertEquals(one, run(2, units));
        assertEquals(one, run(7, units));
    }

    @Tag("exact")
    @Test
    void given_no_units_then_there_are_no_results() {
        assertEquals(List.of(), run(2, List.of()));
    }

    @Tag("message")
    @Test
    void given_problems_in_several_units_then_all_are_reported_in_order_under_the_first_cause() {
        AtomicInteger finished = new AtomicInteger();
        List<Callable<Integer>> units = List.of(finished::incrementAndGet, failing(InputException.Cause.DATA, "one", "two"), finished::incrementAndGet,
            failing(InputException.Cause.REQUIREMENT, "three"), finished::incrementAndGet);
        InputException e = assertThrows(InputException.class, () -> run(2, units));
        assertEquals(InputException.Cause.DATA, e.reason());
        assertEquals(List.of("one", "two", "three"), e.problems().stream().map(Problem::what).toList());
        assertEquals(3, finished.get());
    }

    @Tag("exact")
    @Test
    void given_a_bug_in_a_unit_then_it_passes_through_as_it_is() {
        IllegalStateException bug = new IllegalStateException("ours");
        List<Callable<Integer>> units = List.of(() -> 1, () -> {
            throw bug;
        });
        assertSame(bug, assertThrows(IllegalStateException.class, () -> run(2, units)));
    }

    @Tag("exact")
    @Test
    void given_an_error_of_the_machine_in_a_unit_then_it_is_the_cause_of_what_is_thrown() {
        StackOverflowError error = new StackOverflowError();
        List<Callable<Integer>> units = List.of(() -> {
            throw error;
        });
        assertSame(error, assertThrows(IllegalStateException.class, () -> run(1, units)).getCause());
    }
}
