package tracewright.study;

import java.lang.annotation.ElementType;
import java.lang.annotation.Retention;
import java.lang.annotation.RetentionPolicy;
import java.lang.annotation.Target;

/** Describes one key of a study or layout file; the key's name is the record component's in snake_case. */
@Retention(RetentionPolicy.RUNTIME)
@Target(ElementType.RECORD_COMPONENT)
public @interface Key {

    /** One sentence for the schema and for editors: meaning and unit. */
    String value();

    /** Value of a key that was left out, as it would be written in the file; empty: the key is required unless Optional. */
    String byDefault() default "";
}
