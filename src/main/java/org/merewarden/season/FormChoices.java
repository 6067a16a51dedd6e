package org.merewarden.season;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Optional;
import java.util.stream.Stream;
import org.merewarden.account.People;
import org.merewarden.account.Person;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.web.Choice;
import org.springframework.context.MessageSource;
import org.springframework.context.i18n.LocaleContextHolder;
import org.springframework.stereotype.Component;

/** What a landing form offers. */
@Component
class FormChoices {
    private static final List<String> FATES = List.of("kept", "discarded", "released", "seized");

    private final Register register;
    private final People people;
    private final MessageSource messages;

    FormChoices(Register register, People people, MessageSource messages) {
        this.register = register;
        this.people = people;
        this.messages = messages;
    }

    record Choices(
            List<Choice> waters,
            List<Choice> cooperatives,
            List<Choice> sectors,
            List<Choice> species,
            List<Choice> presentations,
            List<Choice> fates) {}

    /** @param lake code of the chosen water, whose stocks come first; empty where none is chosen yet */
    Choices of(String lake) {
        Optional<Person> who = people.current();
        return new Choices(
                register.waterBodies().stream()
                        .filter(w -> who.map(p -> p.mayLogAt(w.code())).orElse(false))
                        .map(w -> new Choice(w.code(), w.name()))
                        .toList(),
                register.cooperatives().stream()
                        .map(c -> new Choice(c.code(), c.name()))
                        .toList(),
                words("season.sector.", FormReader.SECTORS),
                species(lake),
                register.presentations().stream().map(p -> new Choice(p, p)).toList(),
                words("season.fate.", FATES));
    }

    private List<Choice> species(String lake) {
        Map<String, String> names = new LinkedHashMap<>();
        List<StockView> stocks = register.stocks();
        Stream<StockView> here = stocks.stream().filter(s -> s.lake().equals(lake));
        here.forEach(s -> names.putIfAbsent(s.speciesKey(), name(s)));
        names.put(Entry.MIXED, word("season.mixed"));
        stocks.stream()
                .sorted(java.util.Comparator.comparing(StockView::speciesName))
                .forEach(s -> names.putIfAbsent(s.speciesKey(), name(s)));
        List<Choice> choices = new ArrayList<>();
        names.forEach((key, name) -> choices.add(new Choice(key, name)));
        return choices;
    }

    private static String name(StockView s) {
        return s.population().isEmpty() ? s.speciesName() : s.speciesName() + " (" + s.population() + ")";
    }

    private List<Choice> words(String prefix, List<String> codes) {
        return codes.stream()
                .map(code -> new Choice(code, word(prefix + code.replace(' ', '-'))))
                .toList();
    }

    private String word(String key) {
        Locale locale = LocaleContextHolder.getLocale();
        return messages.getMessage(key, null, locale);
    }
}
