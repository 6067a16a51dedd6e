package org.merewarden.web;

import com.openhtmltopdf.extend.FSTextBreaker;
import java.text.BreakIterator;
import java.util.Locale;

/** Where a line may end: as the platform says, but not behind an apostrophe inside a word. */
final class WholeWords implements FSTextBreaker {
    private static final char APOSTROPHE = '’';

    private final BreakIterator breaks;
    private String text = "";

    WholeWords(Locale locale) {
        breaks = BreakIterator.getLineInstance(locale);
    }

    @Override
    public void setText(String newText) {
        text = newText;
        breaks.setText(newText);
    }

    @Override
    public int next() {
        int at = breaks.next();
        while (at > 0
                && at < text.length()
                && text.charAt(at - 1) == APOSTROPHE
                && Character.isLetter(text.charAt(at))) {
            at = breaks.next();
        }
        return at;
    }
}
