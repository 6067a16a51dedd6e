package org.merewarden.waterbody;

import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Objects;
import java.util.function.Function;
import java.util.stream.Collectors;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.web.Choice;
import org.merewarden.web.Figures;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Component;

/** Finished strings for the register's read pages. */
@Component
class RegisterPages {
    record LakeRow(String path, String name, String district, String kind, String area, String stocks) {}

    /** @param key suffix of the message key */
    record Fact(String key, String value) {}

    record StockRow(String path, String editPath, String name, String scientific, String recruitment, String shares) {}

    record ShareRow(String stockPath, String stock, String lake, String share) {}

    record ConversionRow(String species, String presentation, String from, String factor) {}

    /** Another feature's part of a water body's page, with what its fragment shows. */
    record Part(String template, Object view) {}

    record CooperativeRow(String path, String name, String rights) {}

    private final Register register;
    private final WeightConversions conversions;
    private final List<LakePart> parts;

    RegisterPages(Register register, WeightConversions conversions, List<LakePart> parts) {
        this.register = register;
        this.conversions = conversions;
        this.parts = parts;
    }

    List<LakeRow> lakes(LakeFilter filter) {
        Map<Long, List<StockView>> stocks =
                register.stocks().stream().collect(Collectors.groupingBy(StockView::waterBodyId));
        return register.waterBodies().stream()
                .filter(filter::admits)
                .map(w -> new LakeRow(
                        w.path(),
                        w.name(),
                        Objects.requireNonNullElse(w.district(), Figures.UNKNOWN),
                        w.kind(),
                        Figures.withUnit(w.areaHectares(), "ha"),
                        stocks.getOrDefault(w.id(), List.of()).stream()
                                .map(StockView::speciesName)
                                .collect(Collectors.joining(", "))))
                .toList();
    }

    List<Choice> districts() {
        Stream<String> names = register.waterBodies().stream()
                .map(WaterBodyView::district)
                .filter(Objects::nonNull)
                .distinct()
                .sorted();
        return names.map(d -> new Choice(d, d)).toList();
    }

    static List<Fact> facts(WaterBodyDetails lake) {
        return List.of(
                new Fact("district", Objects.requireNonNullElse(lake.district, Figures.UNKNOWN)),
                new Fact("kind", lake.kind),
                new Fact("area", Figures.withUnit(lake.areaHectares, "ha")),
                new Fact("meanDepth", Figures.withUnit(lake.meanDepthMetres, "m")),
                new Fact("maxDepth", Figures.withUnit(lake.maxDepthMetres, "m")),
                new Fact("elevation", Figures.withUnit(lake.elevationMetres, "m")),
                new Fact("position", position(lake)),
                new Fact("dissolvedSolids", Figures.withUnit(lake.dissolvedSolidsMgPerLitre, "mg/L")),
                new Fact("conductivity", Figures.withUnit(lake.conductivityMicrosiemensPerCm, "µS/cm")),
                new Fact("airTemperature", Figures.withUnit(lake.meanAirTemperatureCelsius, "°C")));
    }

    private static String position(WaterBodyDetails lake) {
        return lake.latitude == null || lake.longitude == null
                ? Figures.UNKNOWN
                : String.format(Locale.ROOT, "%.4f, %.4f", lake.latitude, lake.longitude);
    }

    List<StockRow> stocksOf(String lake) {
        Map<Long, List<RightView>> rights =
                register.rights().stream().collect(Collectors.groupingBy(RightView::stockId));
        return register.stocks().stream()
                .filter(s -> s.lake().equals(lake))
                .map(s -> new StockRow(
                        s.path(),
                        s.path() + "/edit",
                        s.population().isEmpty() ? s.speciesName() : s.speciesName() + " (" + s.population() + ")",
                        register.species(s.species())
                                .map(Species::scientificName)
                                .orElse(s.species()),
                        s.recruitment(),
                        rights.getOrDefault(s.id(), List.of()).stream()
                                .map(r -> r.cooperativeName() + " " + Figures.sig(r.sharePercent()) + " %")
                                .collect(Collectors.joining(", "))))
                .toList();
    }

    List<Part> partsOf(String lake) {
        WaterBodyView view = register.waterBody(lake).orElseThrow(() -> new NotFound("water body " + lake));
        return parts.stream().map(p -> new Part(p.template(), p.view(view))).toList();
    }

    List<CooperativeRow> cooperatives() {
        Map<Long, Long> counts = register.rights().stream()
                .collect(Collectors.groupingBy(RightView::cooperativeId, Collectors.counting()));
        return register.cooperatives().stream()
                .map(c -> new CooperativeRow(
                        "/cooperatives/" + c.code(), c.name(), String.valueOf(counts.getOrDefault(c.id(), 0L))))
                .toList();
    }

    List<ShareRow> shares(CooperativeView cooperative) {
        Map<Long, StockView> stocks =
                register.stocks().stream().collect(Collectors.toMap(StockView::id, Function.identity()));
        return register.rightsOfCooperative(cooperative.id()).stream()
                .map(r -> shareRow(Objects.requireNonNull(stocks.get(r.stockId())), r))
                .toList();
    }

    private static ShareRow shareRow(StockView stock, RightView right) {
        return new ShareRow(
                stock.path(), stock.title(), stock.lakeName(), Figures.sig(right.sharePercent()) + "\u00a0%");
    }

    List<Choice> stockChoices() {
        return register.stocks().stream()
                .map(s -> new Choice(s.key(), s.title()))
                .toList();
    }

    List<Choice> speciesChoices() {
        return register.species().stream()
                .map(s -> new Choice(s.code(), s.englishName() + " – " + s.scientificName() + " (" + s.code() + ")"))
                .toList();
    }

    List<ConversionRow> conversions() {
        return conversions.findAllByOrderByDetailsSpeciesAscDetailsPresentationAscDetailsValidFromAsc().stream()
                .map(c -> new ConversionRow(
                        register.species(c.details.species)
                                .map(Species::englishName)
                                .orElse(c.details.species),
                        c.details.presentation,
                        Figures.date(c.details.validFrom),
                        Figures.sig(c.details.factor)))
                .toList();
    }

    /** What the list shows; blank parts admit everything. */
    record LakeFilter(
            @Nullable String name,
            @Nullable String district,
            @Nullable String kind) {
        boolean admits(WaterBodyView lake) {
            return (blank(name) || contains(lake.name(), name))
                    && (blank(district) || Objects.equals(district, lake.district()))
                    && (blank(kind) || Objects.equals(kind, lake.kind()));
        }

        private static boolean contains(String text, @Nullable String part) {
            return part != null
                    && text.toLowerCase(Locale.ROOT).contains(part.strip().toLowerCase(Locale.ROOT));
        }

        private static boolean blank(@Nullable String text) {
            return text == null || text.isBlank();
        }
    }
}
