package tracewright.analysis;

import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.Callable;
import java.util.concurrent.CancellationException;
import java.util.concurrent.ExecutionException;
import java.util.concurrent.ExecutorService;
import java.util.concurrent.Executors;
import java.util.concurrent.Future;
import tracewright.study.InputException;
import tracewright.study.Problem;

/** A fixed number of threads that work through independent units; results come back in the order of the units. */
final class Workers implements AutoCloseable {

    private final ExecutorService pool;

    Workers(int threads) {
        this.pool = Executors.newFixedThreadPool(threads, task -> {
            Thread thread = new Thread(task, "worker");
            thread.setDaemon(true);
            return thread;
        });
    }

    /**
     * Runs every unit to its end, so that the problems of all are known.
     *
     * @throws InputException with the problems of every unit that had some, of the first cause met
     */
    <T> List<T> all(List<Callable<T>> units) {
        List<T> results = new ArrayList<>();
        List<Problem> problems = new ArrayList<>();
        InputException first = null;
        for (Future<T> future : submit(units)) {
            try {
                results.add(future.get());
            } catch (ExecutionException e) {
                if (e.getCause() instanceof InputException input) {
                    first = first == null ? input : first;
                    problems.addAll(input.problems());
                } else if (e.getCause() instanceof RuntimeException bug) {
                    throw bug;
                } else {
                    throw new IllegalStateException("a unit of work failed", e.getCause());
                }
            } catch (InterruptedException e) {
                Thread.currentThread().interrupt();
                throw new CancellationException("interrupted");
            }
        }
        if (first != null) {
            throw new InputException(first.reason(), problems);
        }
        return results;
    }

    private <T> List<Future<T>> submit(List<Callable<T>> units) {
        return units.stream().map(pool::submit).toList();
    }

    @Override
    public void close() {
        pool.shutdownNow();
    }
}
