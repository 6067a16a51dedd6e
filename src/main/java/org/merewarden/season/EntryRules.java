package org.merewarden.season;

import java.time.LocalDate;
import java.time.YearMonth;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.intake.Problem;
import org.merewarden.waterbody.CooperativeView;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.StockView;
import org.merewarden.waterbody.WaterBodyView;
import org.merewarden.web.Seasons;

/**
 * The one place that says whether an entry can be stored and what is remarkable about it; used by the form and by the
 * importer alike. Remembers what it let through: make one for each form or import.
 *
 * <p>An entry is refused only where it cannot be understood: an unknown water, cooperative, species or presentation, a
 * date to come, a weight out of bounds. It is never refused for being unwelcome.
 */
final class EntryRules {
    /** A single line heavier than this is a slip of the pen (grams for kilograms). */
    static final double MAX_WEIGHT_KG = 1_000_000;

    static final double MAX_EFFORT = 100_000;

    private final Register register;
    private final Seasons seasons;
    private final References references;
    private final LocalDate today;
    private final int currentSeason;
    private final Map<YearMonth, Integer> seasonOfMonth = new HashMap<>();
    private final Map<String, Optional<Double>> factors = new HashMap<>();
    /** kg that this instance has let through, by stock and season */
    private final Map<String, Double> addedKg = new HashMap<>();

    EntryRules(Register register, Seasons seasons, References references) {
        this.register = register;
        this.seasons = seasons;
        this.references = references;
        today = seasons.today();
        currentSeason = seasons.of(today);
    }

    /** What comes next stands for that row, which therefore no longer counts towards its limit. */
    void replaces(LandingRow row) {
        if (row.taken() && row.stockId() != null) {
            addedKg.merge(row.stockId() + ":" + row.season(), -row.liveWeightKg(), Double::sum);
        }
    }

    /** What stands against storing the entry; columns are those of the import format. */
    List<Problem> problems(Entry entry) {
        List<Problem> problems = new ArrayList<>();
        dateProblem(entry.landedOn()).ifPresent(problems::add);
        if (references.water(entry.lake()).isEmpty()) {
            problems.add(new Problem("water_body", entry.lake(), "no water body of this code is in the register"));
        }
        if (!entry.species().equals(Entry.MIXED)
                && register.species(entry.species()).isEmpty()) {
            problems.add(new Problem(
                    "species", entry.species(), "not a species code of the FAO list; use three letters, or mixed"));
        }
        String cooperative = entry.cooperative();
        if (cooperative != null && references.cooperative(cooperative).isEmpty()) {
            problems.add(new Problem("cooperative", cooperative, "no cooperative of this code is in the register"));
        }
        if (!(entry.weightKg() >= 0 && entry.weightKg() <= MAX_WEIGHT_KG)) {
            problems.add(new Problem(
                    "weight_kg", String.valueOf(entry.weightKg()), "must be between 0 and 1,000,000 kg on one line"));
        }
        if (factor(entry).isEmpty()) {
            problems.add(presentationProblem(entry));
        }
        return problems;
    }

    private Optional<Problem> dateProblem(LocalDate date) {
        if (date.isAfter(today)) {
            return Optional.of(new Problem(
                    "date",
                    date.toString(),
                    "lies in the future; today is " + today + ", enter the day of the landing"));
        }
        return date.getYear() < 1800
                ? Optional.of(new Problem("date", date.toString(), "must be 1800 or later"))
                : Optional.empty();
    }

    private Problem presentationProblem(Entry entry) {
        List<String> known = register.presentations().stream()
                .filter(p -> factorOf(entry.species(), p, entry.landedOn()).isPresent())
                .toList();
        return new Problem(
                "presentation",
                entry.presentation(),
                "no factor to live weight is recorded for " + entry.species() + " on " + entry.landedOn()
                        + "; known are: " + String.join(", ", known));
    }

    private Optional<Double> factor(Entry entry) {
        return factorOf(entry.species(), entry.presentation(), entry.landedOn());
    }

    private Optional<Double> factorOf(String species, String presentation, LocalDate date) {
        if (presentation.equals("whole")) {
            return Optional.of(1.0);
        }
        return factors.computeIfAbsent(
                species + "|" + presentation + "|" + date, k -> register.conversionFactor(species, presentation, date));
    }

    /**
     * References, live weight and flags of an entry without problems. What was checked before by the same instance counts
     * towards the limit.
     */
    Checked check(Entry entry) {
        double factor = factor(entry)
                .orElseThrow(() ->
                        new IllegalArgumentException(presentationProblem(entry).rule()));
        int season = seasonOfMonth.computeIfAbsent(YearMonth.from(entry.landedOn()), m -> seasons.of(entry.landedOn()));
        StockView stock = references.stock(entry.lake(), entry.speciesKey()).orElse(null);
        WaterBodyView water = references
                .water(entry.lake())
                .orElseThrow(() -> new IllegalArgumentException("no such water body: " + entry.lake()));
        CooperativeView cooperative = entry.cooperative() == null
                ? null
                : references.cooperative(entry.cooperative()).orElse(null);
        Checked plain = new Checked(
                entry,
                season,
                water.id(),
                stock == null ? null : stock.id(),
                cooperative == null ? null : cooperative.id(),
                factor,
                entry.weightKg() * factor,
                List.of());
        return withFlags(plain);
    }

    private Checked withFlags(Checked c) {
        List<Flag> flags = new ArrayList<>();
        Long stockId = c.stockId();
        if (stockId != null && c.taken()) {
            limitFlags(c, stockId, flags);
        }
        if (c.entry().species().equals(Entry.MIXED)) {
            flags.add(Flag.MIXED);
        } else if (stockId == null) {
            flags.add(Flag.NO_STOCK);
        }
        String cooperative = c.entry().cooperative();
        if (stockId != null && cooperative != null && !references.right(cooperative, stockId)) {
            flags.add(Flag.NO_RIGHT);
        }
        if (c.season() < currentSeason) {
            flags.add(Flag.EARLIER_SEASON);
        }
        if (c.entry().fate().equals("seized")) {
            flags.add(Flag.SEIZED);
        }
        return new Checked(
                c.entry(),
                c.season(),
                c.waterBodyId(),
                stockId,
                c.cooperativeId(),
                c.factor(),
                c.liveWeightKg(),
                flags);
    }

    private void limitFlags(Checked c, long stockId, List<Flag> flags) {
        double added = addedKg.merge(stockId + ":" + c.season(), c.liveWeightKg(), Double::sum);
        LimitView limit = references.limit(stockId, c.season()).orElse(null);
        if (limit == null) {
            // a season for which no limit is kept here says nothing about a single landing
            if (references.anyLimit(c.season())) {
                flags.add(Flag.NO_LIMIT);
            }
            return;
        }
        if (limit.closure() && c.entry().landedOn().isBefore(limit.validFrom())) {
            // landed while the stock was open, under what was allowed then
            limit = references.beforeClosure(stockId, c.season()).orElse(null);
            if (limit == null) {
                flags.add(Flag.NO_LIMIT);
                return;
            }
        }
        double taken = references.taken(stockId, c.season()) + added;
        if (over(taken, limit.toBeLoggedTonnes())) {
            flags.add(Flag.OVER_LIMIT);
        }
        if (c.entry().landedOn().isAfter(limit.validTo())) {
            flags.add(Flag.AFTER_VALIDITY);
        } else if (c.entry().landedOn().isBefore(limit.validFrom())) {
            flags.add(Flag.BEFORE_VALIDITY);
        }
    }

    /** A gram is forgiven: sums of decimal weights do not meet a limit exactly. */
    private static boolean over(double takenKg, @Nullable Double toBeLoggedTonnes) {
        return toBeLoggedTonnes != null && takenKg > toBeLoggedTonnes * 1000 + 0.001;
    }
}
