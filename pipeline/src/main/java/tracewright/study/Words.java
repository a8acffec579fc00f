package tracewright.study;

import java.lang.reflect.Field;
import java.util.Locale;

/** The words that stand in files for Java names. */
final class Words {

    private Words() {
    }

    /** {@code spacingFm} to {@code spacing_fm}. */
    static String key(String component) {
        StringBuilder key = new StringBuilder();
        for (char c : component.toCharArray()) {
            if (Character.isUpperCase(c)) {
                key.append('_');
            }
            key.append(Character.toLowerCase(c));
        }
        return key.toString();
    }

    /** Word of an enum constant: its {@link Case}, or its name in lower case with hyphens. */
    static String of(Enum<?> constant) {
        try {
            Field field = constant.getDeclaringClass().getField(constant.name());
            Case word = field.getAnnotation(Case.class);
            return word != null ? word.value() : constant.name().toLowerCase(Locale.ROOT).replace('_', '-');
        } catch (NoSuchFieldException e) {
            throw new IllegalStateException(e);
        }
    }
}
