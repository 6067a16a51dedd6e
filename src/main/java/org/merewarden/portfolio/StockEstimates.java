package org.merewarden.portfolio;

import java.math.BigDecimal;
import java.math.MathContext;
import java.text.NumberFormat;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** An assessment's named estimates, with digits enough to be compared with what was published elsewhere. */
@Component
class StockEstimates {
    private static final MathContext SIX_DIGITS = new MathContext(6);

    private final Texts texts;

    StockEstimates(Texts texts) {
        this.texts = texts;
    }

    /** The estimates that are, or are not, of the older estimators; by name. */
    List<StockPage.Term> terms(Map<String, Double> estimates, boolean older) {
        return new TreeMap<>(estimates)
                .entrySet().stream()
                        .filter(e -> isOlder(e.getKey()) == older)
                        .map(e -> new StockPage.Term(name(e.getKey()), sixDigits(e.getValue())))
                        .toList();
    }

    private static boolean isOlder(String key) {
        return key.startsWith("difference_") || key.startsWith("schaefer_") || key.startsWith("fox_");
    }

    /** The text for the key's first part, then the series; the key itself in words where no text is known. */
    private String name(String key) {
        int colon = key.indexOf(':');
        String quantity = colon < 0 ? key : key.substring(0, colon);
        String word = texts.orElse("estimate." + quantity, quantity.replace('_', ' '));
        return colon < 0 ? word : word + ": " + key.substring(colon + 1).replace(":", ", ");
    }

    static String sixDigits(double value) {
        if (!Double.isFinite(value)) {
            return org.merewarden.web.Figures.UNKNOWN;
        }
        BigDecimal rounded = new BigDecimal(value).round(SIX_DIGITS).stripTrailingZeros();
        NumberFormat format = NumberFormat.getNumberInstance(LocaleContextHolder.getLocale());
        format.setMaximumFractionDigits(Math.max(0, rounded.scale()));
        return format.format(rounded);
    }
}
