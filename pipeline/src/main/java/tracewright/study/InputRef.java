package tracewright.study;

import static java.util.Objects.requireNonNull;

/**
 * A constant that a study needs: the name of one of its {@code inputs}, or a number written in place. Numbers that share an
 * input share its fluctuation; a number written in place has one of its own, named after the key that holds it.
 *
 * @param name  name of the cause of uncertainty (without the prefix {@code input:})
 * @param value value and error, already looked up
 */
public record InputRef(String name, UncertainValue value) {

    public InputRef {
        requireNonNull(name, "name");
        requireNonNull(value, "value");
    }
}
