package org.merewarden.portfolio;

import java.time.Instant;
import java.time.LocalDate;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Random;
import org.jspecify.annotations.Nullable;
import org.merewarden.advice.LimitView;
import org.merewarden.advice.StandingView;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.core.inference.EvidenceStrength;
import org.merewarden.core.inference.Posterior;
import org.merewarden.core.inference.Verdict;
import org.merewarden.season.UptakeView;
import org.merewarden.waterbody.RightView;
import org.merewarden.waterbody.StockView;
import org.springframework.context.MessageSource;
import org.springframework.context.support.ResourceBundleMessageSource;

/** Hand-made views for tests. */
final class Made {
    private Made() {}

    static Texts texts() {
        return new Texts(messages());
    }

    static MessageSource messages() {
        ResourceBundleMessageSource messages = new ResourceBundleMessageSource();
        messages.setBasenames("messages/portfolio", "messages/assessment", "messages/records", "messages/common");
        messages.setDefaultEncoding("UTF-8");
        messages.setFallbackToSystemLocale(false);
        return messages;
    }

    static StockView stock(long id, String lake, String species, String district) {
        String name = lake.substring(0, 1).toUpperCase(Locale.ROOT) + lake.substring(1) + " Water";
        return new StockView(
                id,
                id,
                lake,
                name,
                district,
                1000,
                species.toUpperCase(Locale.ROOT),
                "",
                species,
                "natural",
                null,
                null,
                null,
                null,
                null);
    }

    static AssessmentView assessment(long stockId, double msy, double bOverBmsy, String strength) {
        return assessment(stockId, msy, bOverBmsy, strength, false);
    }

    static AssessmentView assessment(
            long stockId, double msy, double bOverBmsy, String strength, boolean closedLastSeason) {
        double bmsy = 4 * msy;
        return new AssessmentView(
                100 + stockId,
                stockId,
                1,
                Instant.parse("2026-0" + (1 + stockId % 9) + "-03T10:00:00Z"),
                "anna",
                "0".repeat(64),
                "for a test",
                2020,
                2025,
                true,
                List.of("The estimation settled."),
                strength,
                0.8 * msy,
                msy,
                1.25 * msy,
                0.25,
                8 * msy,
                0.8 * bOverBmsy * bmsy,
                bOverBmsy * bmsy,
                1.25 * bOverBmsy * bmsy,
                0.8 * bOverBmsy,
                bOverBmsy,
                1.25 * bOverBmsy,
                0.9 * msy,
                closedLastSeason,
                List.of(1.0, 0.9, bOverBmsy));
    }

    static StandingView standing(long stockId, String standing, double margin) {
        return standing(stockId, standing, margin, 12, "limit");
    }

    static StandingView standing(long stockId, String standing, double margin, double removals, String basis) {
        return standing(stockId, standing, false, margin, removals, basis);
    }

    static StandingView wide(long stockId, String standing) {
        return standing(stockId, standing, true, 0.1, 12, "limit");
    }

    private static StandingView standing(
            long stockId, String standing, boolean wide, double margin, double removals, String basis) {
        return new StandingView(
                stockId,
                100 + stockId,
                2026,
                removals,
                basis,
                standing,
                wide,
                0.11,
                0.11,
                0.02,
                margin - 0.2,
                margin,
                margin + 0.2,
                0.15,
                20.5,
                2.3,
                Instant.EPOCH);
    }

    static LimitView limit(long stockId, String kind, Double amount, String unit) {
        return new LimitView(
                500 + stockId,
                stockId,
                2026,
                kind,
                amount,
                unit,
                1,
                0.9,
                kind.equals("catch") ? 0.9 * Math.max(0, amount - 1) : null,
                LocalDate.of(2026, 1, 1),
                LocalDate.of(2026, 12, 31),
                null,
                null,
                null,
                "for a test",
                Instant.EPOCH,
                "anna",
                "season",
                Instant.EPOCH);
    }

    static LimitView catchLimit(long stockId, double tonnes) {
        return limit(stockId, "catch", tonnes, "t");
    }

    /** The stock is closed from 5 June 2026, 14:00. */
    static LimitView closure(long stockId) {
        return new LimitView(
                900 + stockId,
                stockId,
                2026,
                "catch",
                0.0,
                "t",
                0,
                1,
                0.0,
                LocalDate.of(2026, 6, 5),
                LocalDate.of(2026, 12, 31),
                null,
                null,
                null,
                "for a test",
                Instant.EPOCH,
                "anna",
                "closure",
                Instant.parse("2026-06-05T14:00:00Z"));
    }

    /** Closed after the limit was in force. */
    static Entry closed(StockView stock, AssessmentView a, StandingView s, @Nullable LimitView before, UptakeView u) {
        return new Entry(stock, List.of(), a, s, closure(stock.id()), before, u);
    }

    static UptakeView uptake(long stockId, double kg, String upTo, String... silent) {
        return new UptakeView(stockId, kg, upTo == null ? null : LocalDate.parse(upTo), List.of(silent));
    }

    static Entry entry(StockView stock, AssessmentView a, StandingView s, LimitView l, UptakeView u) {
        return new Entry(
                stock, List.of(new RightView(7, "north-coop", "North Cooperative", stock.id(), 100)), a, s, l, null, u);
    }

    /** 200 draws about the given values over six seasons, biomass at BMSY, F at FMSY. */
    static Posterior posterior(double msy, double fmsy, double shape, int seasons) {
        Random random = new Random(42);
        int draws = 200;
        double[] msys = new double[draws];
        double[] fmsys = new double[draws];
        double[] shapes = new double[draws];
        double[][] biomass = new double[draws][seasons + 1];
        double[][] fishing = new double[draws][seasons];
        for (int i = 0; i < draws; i++) {
            msys[i] = msy * Math.exp(0.1 * random.nextGaussian());
            fmsys[i] = fmsy * Math.exp(0.1 * random.nextGaussian());
            shapes[i] = shape;
            java.util.Arrays.fill(biomass[i], msys[i] / fmsys[i]);
            java.util.Arrays.fill(fishing[i], fmsys[i]);
        }
        return new Posterior(
                "for a test",
                2020,
                msys,
                fmsys,
                shapes,
                biomass,
                fishing,
                Map.of("msy_t", 19.4525, "schaefer_a", 444.454, "catchability:nets", 0.264203),
                EvidenceStrength.FAIR,
                new Verdict(true, List.of("The estimation settled.")));
    }
}
