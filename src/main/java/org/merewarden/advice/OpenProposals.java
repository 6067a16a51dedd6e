package org.merewarden.advice;

import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.assessment.AssessmentView;
import org.merewarden.assessment.Assessments;
import org.merewarden.web.Figures;
import org.merewarden.web.Texts;
import org.merewarden.web.Who;
import org.springframework.stereotype.Component;

/** Proposals that wait for a decision, with all that an approver weighs, in finished strings. */
@Component
class OpenProposals {
    private final Assessments assessments;
    private final Recommendations recommendations;
    private final AllocationTable allocations;
    private final PolicyStore policies;
    private final Texts texts;

    OpenProposals(
            Assessments assessments,
            Recommendations recommendations,
            AllocationTable allocations,
            PolicyStore policies,
            Texts texts) {
        this.assessments = assessments;
        this.recommendations = recommendations;
        this.allocations = allocations;
        this.policies = policies;
        this.texts = texts;
    }

    /**
     * A proposal that waits for a decision.
     *
     * @param facts name and value, in order
     * @param policy that the rule has changed since it recommended; null where it has not
     * @param doubt what is wrong with the assessment behind it, so that its issuer must write why
     */
    record Open(
            String id,
            String title,
            String by,
            String at,
            String reason,
            boolean own,
            @Nullable String provisional,
            @Nullable String policy,
            @Nullable String doubt,
            boolean measures,
            List<String[]> facts,
            List<AllocationTable.Part> parts) {}

    List<Open> open(long stockId, List<LimitFile> files) {
        List<LimitFile> waiting = files.stream().filter(LimitFile::open).toList();
        if (waiting.isEmpty()) {
            return List.of();
        }
        Optional<AssessmentView> latest = assessments.latest(stockId);
        Map<Long, Recommendations.Kept> recommended = recommendations.ofStock(stockId);
        int policy = policies.inForce().number();
        Map<Long, List<AllocationTable.Part>> parts = allocations.ofProposals(stockId, waiting);
        return waiting.stream()
                .map(file -> open(
                        file,
                        replaced(file, files),
                        latest,
                        recommended,
                        policy,
                        parts.getOrDefault(file.id(), List.of())))
                .toList();
    }

    private Open open(
            LimitFile file,
            @Nullable String replaced,
            Optional<AssessmentView> latest,
            Map<Long, Recommendations.Kept> recommended,
            int policy,
            List<AllocationTable.Part> parts) {
        NewLimit limit = file.limit();
        LimitHistory.Decision proposal = file.latest();
        Long number = limit.terms().recommendationId();
        Recommendations.Kept beside = number == null ? null : recommended.get(number);
        return new Open(
                Long.toString(file.id()),
                texts.of("advice.open.what", Long.toString(file.id()), what(limit)),
                proposal.decidedBy(),
                proposal.when(),
                proposal.reason(),
                proposal.decidedBy().equals(Who.name()),
                limit.terms().reviewBy() == null
                        ? null
                        : texts.of(
                                "advice.open.provisional",
                                Figures.date(limit.terms().reviewBy())),
                changed(beside, policy),
                Decisions.doubt(limit, latest)
                        .map(d -> texts.of("advice.open.doubt." + d))
                        .orElse(null),
                limit.kind().equals("measures only"),
                facts(limit, replaced, beside),
                parts);
    }

    /** The season's limit that issuing this one would end. */
    private @Nullable String replaced(LimitFile file, List<LimitFile> files) {
        return files.stream()
                .filter(other -> other.limit().season() == file.limit().season()
                        && other.state().equals(LimitWriter.ISSUED))
                .findFirst()
                .map(other -> texts.of("advice.open.replaces.what", Long.toString(other.id()), what(other.limit())))
                .orElse(null);
    }

    private @Nullable String changed(Recommendations.@Nullable Kept beside, int policy) {
        return beside == null || beside.policyNumber() == policy
                ? null
                : texts.of("advice.open.policy", Integer.toString(beside.policyNumber()), Integer.toString(policy));
    }

    private List<String[]> facts(NewLimit limit, @Nullable String replaced, Recommendations.@Nullable Kept beside) {
        Map<String, @Nullable String> facts = new LinkedHashMap<>();
        facts.put("amount", amount(limit));
        facts.put("replaces", replaced);
        if (!limit.terms().closure()) {
            facts.put("recommended", recommended(beside));
        }
        facts.put("difference", limit.terms().differenceReason());
        facts.put("from", Figures.dateTime(limit.terms().effectiveAt()));
        facts.put("setAsides", limit.kind().equals("catch") ? Figures.decided(limit.setAsidesTonnes()) : null);
        facts.put("toBeLogged", AdviceView.toBeLogged(limit));
        facts.put("validity", Figures.date(limit.validFrom()) + " – " + Figures.date(limit.validTo()));
        return facts.entrySet().stream()
                .filter(f -> f.getValue() != null && !f.getValue().equals(Figures.UNKNOWN))
                .map(f -> new String[] {texts.of("advice.open." + f.getKey()), Objects.requireNonNull(f.getValue())})
                .toList();
    }

    private String recommended(Recommendations.@Nullable Kept beside) {
        return beside == null
                ? texts.of("advice.open.recommended.nothing")
                : texts.of(
                        "advice.open.recommended.by",
                        Figures.decided(beside.limitTonnes()),
                        Integer.toString(beside.policyNumber()));
    }

    /** "12.5 t for season 2026", "closed, season 2026". */
    String what(NewLimit limit) {
        String season = AdviceView.season(limit.season());
        return limit.terms().closure()
                ? texts.of("advice.what.closure", season)
                : texts.of("advice.what." + limit.terms().purpose(), amount(limit), season);
    }

    static String amount(NewLimit limit) {
        if (limit.amount() == null) {
            return limit.kind();
        }
        return limit.kind().equals("catch")
                ? Figures.decided(limit.amount())
                : Figures.withUnit(limit.amount(), limit.unit());
    }
}
