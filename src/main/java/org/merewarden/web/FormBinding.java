package org.merewarden.web;

import java.beans.PropertyEditorSupport;
import java.util.function.Function;
import org.jspecify.annotations.Nullable;
import org.springframework.beans.PropertyAccessException;
import org.springframework.beans.propertyeditors.StringTrimmerEditor;
import org.springframework.validation.BindingResult;
import org.springframework.validation.DefaultBindingErrorProcessor;
import org.springframework.validation.FieldError;
import org.springframework.web.bind.WebDataBinder;

/**
 * How forms with public fields are filled: texts are trimmed and empty means unknown, numbers may carry a decimal comma,
 * and a text that is no number is answered with that text.
 */
public final class FormBinding {
    private FormBinding() {}

    /** For forms with public fields; to be called from a controller's {@code @InitBinder}. */
    public static void prepare(WebDataBinder binder) {
        binder.initDirectFieldAccess();
        binder.registerCustomEditor(String.class, new StringTrimmerEditor(true));
        numbers(binder);
    }

    /** For forms with accessors: numbers as people write them, and an answer that names what is none. */
    public static void numbers(WebDataBinder binder) {
        binder.setBindingErrorProcessor(new NamesTheValue());
        binder.registerCustomEditor(Double.class, new NumberEditor(FormBinding::decimal, v -> Cells.plain((Double) v)));
        binder.registerCustomEditor(Integer.class, new NumberEditor(Integer::valueOf, Object::toString));
    }

    /** A comma that may as well part thousands (1,250) is refused: taken for a decimal it would be a thousand times off. */
    private static Double decimal(String text) {
        String pointed = text.indexOf('.') < 0 ? text.replace(',', '.') : text;
        if (!pointed.matches("[+-]?(\\d+(\\.\\d*)?|\\.\\d+)([eE][+-]?\\d{1,3})?")
                || text.matches("[+-]?[1-9]\\d{0,2},\\d{3}")) {
            throw new NumberFormatException(text);
        }
        double value = Double.parseDouble(pointed);
        if (Double.isInfinite(value)) {
            throw new NumberFormatException(text);
        }
        return value;
    }

    private static final class NumberEditor extends PropertyEditorSupport {
        private final Function<String, Object> read;
        private final Function<Object, String> write;

        NumberEditor(Function<String, Object> read, Function<Object, String> write) {
            this.read = read;
            this.write = write;
        }

        @Override
        public void setAsText(@Nullable String text) {
            setValue(text == null || text.isBlank() ? null : read.apply(text.strip()));
        }

        @Override
        public String getAsText() {
            Object value = getValue();
            return value == null ? "" : write.apply(value);
        }
    }

    private static final class NamesTheValue extends DefaultBindingErrorProcessor {
        @Override
        public void processPropertyAccessException(PropertyAccessException problem, BindingResult result) {
            String field = String.valueOf(problem.getPropertyName());
            Object value = problem.getValue();
            result.addError(new FieldError(
                    result.getObjectName(),
                    field,
                    value,
                    true,
                    new String[] {"form.unreadable." + kind(problem), "form.unreadable"},
                    new Object[] {String.valueOf(value)},
                    "cannot be read: “" + value + "”"));
        }

        private static String kind(PropertyAccessException problem) {
            Class<?> type = problem.getPropertyChangeEvent() == null
                    ? null
                    : (problem instanceof org.springframework.beans.TypeMismatchException mismatch
                            ? mismatch.getRequiredType()
                            : null);
            return type == null ? "value" : type.getSimpleName();
        }
    }
}
