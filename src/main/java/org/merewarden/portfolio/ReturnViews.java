package org.merewarden.portfolio;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.merewarden.portfolio.SeasonReturn.Allowed;
import org.merewarden.portfolio.SeasonReturn.Place;
import org.merewarden.portfolio.SeasonReturn.Removed;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** Words and figures of a season's return. */
@Component
class ReturnViews {
    private final Texts texts;

    ReturnViews(Texts texts) {
        this.texts = texts;
    }

    ReturnView view(SeasonReturn r) {
        return new ReturnView(
                Integer.toString(r.season()),
                lede(r),
                r.empty(),
                r.removalsByKey().entrySet().stream()
                        .map(e -> List.of(
                                district(e.getKey().district()),
                                e.getKey().species(),
                                sector(e.getKey().sector()),
                                basis(e.getKey().logged()),
                                Integer.toString(e.getValue().stocks()),
                                Figures.sig(e.getValue().tonnes()),
                                Figures.sig(e.getValue().correctedTonnes())))
                        .toList(),
                r.limitsByKey().entrySet().stream()
                        .map(e -> Stream.concat(
                                        Stream.of(
                                                district(e.getKey().district()),
                                                e.getKey().species()),
                                        allowed(e.getValue()))
                                .toList())
                        .toList(),
                List.of(totals(r, "species", Place::species), totals(r, "district", Place::district)),
                Integer.toString(r.season() - 1),
                Integer.toString(r.season() + 1));
    }

    private List<String> lede(SeasonReturn r) {
        if (r.empty()) {
            return List.of(texts.of("returns.empty", Integer.toString(r.season())));
        }
        List<String> lede = new ArrayList<>();
        if (!r.ended()) {
            lede.add(texts.of("returns.lede.in-progress"));
        }
        Removed removed = r.removed();
        boolean logged = r.removals().stream().anyMatch(SeasonReturn.Removal::logged);
        String tonnes = Figures.tonnes(removed.tonnes());
        lede.add(
                logged && r.lastLanding() != null
                        ? texts.of("returns.lede.logged", tonnes, Figures.date(r.lastLanding()))
                        : texts.of("returns.lede.recorded", tonnes, Figures.tonnes(removed.correctedTonnes())));
        Allowed allowed = r.allowed();
        lede.add(texts.of(
                "returns.lede.limits",
                allowed.limits(),
                Figures.decided(Objects.requireNonNullElse(allowed.tonnes(), 0.0)),
                allowed.without()));
        if (!allowed.closed().isEmpty()) {
            lede.add(texts.of("returns.lede.closed", allowed.closed().size()));
        }
        if (r.unplacedTonnes() > 0) {
            lede.add(texts.of("returns.lede.unplaced", Figures.tonnes(r.unplacedTonnes())));
        }
        return lede;
    }

    private ReturnView.Totals totals(SeasonReturn r, String part, Function<Place, String> name) {
        Map<String, Removed> removed = r.removedBy(name);
        List<List<String>> rows = new ArrayList<>();
        r.allowedBy(name)
                .forEach((key, allowed) -> rows.add(total(
                        part.equals("district") ? district(key) : key,
                        Objects.requireNonNull(removed.get(key)),
                        allowed)));
        rows.add(total(texts.of("returns.all"), r.removed(), r.allowed()));
        return new ReturnView.Totals(
                texts.of("returns.totals." + part), texts.of("returns.column." + part), List.copyOf(rows));
    }

    private List<String> total(String name, Removed removed, Allowed allowed) {
        return Stream.concat(
                        Stream.of(name, Figures.sig(removed.tonnes()), Figures.sig(removed.correctedTonnes())),
                        allowed(allowed))
                .toList();
    }

    private Stream<String> allowed(Allowed a) {
        return Stream.of(
                Integer.toString(a.stocks()),
                Integer.toString(a.limits()),
                Integer.toString(a.without()),
                Figures.decidedFigure(a.tonnes()),
                Figures.decidedFigure(a.setAsides()),
                Figures.decidedFigure(a.toBeLogged()),
                closed(a));
    }

    private String closed(Allowed a) {
        return a.closed().isEmpty()
                ? ""
                : texts.of(
                        a.stocks() == 1 ? "returns.closed" : "returns.closed.some",
                        a.closed().size(),
                        a.stocks(),
                        a.closed().stream().distinct().map(Figures::date).collect(Collectors.joining("; ")));
    }

    String district(String district) {
        return district.isEmpty() ? texts.of("returns.no-district") : district;
    }

    String sector(String sector) {
        return texts.of("season.sector." + sector.replace(' ', '-'));
    }

    String basis(boolean logged) {
        return texts.of(logged ? "returns.basis.logged" : "returns.basis.recorded");
    }
}
