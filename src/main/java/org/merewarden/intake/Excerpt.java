package org.merewarden.intake;

import java.util.regex.Pattern;

/** Shortens texts and shows what cannot be printed, so that a message stays a message, whatever a file holds. */
final class Excerpt {
    private static final Pattern UNPRINTABLE = Pattern.compile("[\\p{Cntrl}&&[^\\t\\r\\n]]|\\p{Cs}");

    private Excerpt() {}

    static String of(String text, int longest) {
        return UNPRINTABLE.matcher(shortened(text, longest)).replaceAll("\uFFFD");
    }

    private static String shortened(String text, int longest) {
        if (text.length() <= longest) {
            return text;
        }
        int end = Character.isHighSurrogate(text.charAt(longest - 2)) ? longest - 2 : longest - 1;
        return text.substring(0, end) + "…";
    }
}
