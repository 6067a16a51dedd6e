package org.merewarden.advice;

import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.stream.IntStream;
import org.jspecify.annotations.Nullable;
import org.merewarden.core.policy.LimitArithmetic;
import org.merewarden.records.SeasonInProgress;
import org.merewarden.waterbody.Register;
import org.merewarden.waterbody.RightView;
import org.merewarden.web.Figures;
import org.springframework.stereotype.Component;

/** What each cooperative would get of a proposed limit, beside what it has logged in that season. */
@Component
class AllocationTable {
    private static final int DIGITS = 12;

    private final LimitStore limits;
    private final Register register;
    private final SeasonInProgress logged;

    AllocationTable(LimitStore limits, Register register, SeasonInProgress logged) {
        this.limits = limits;
        this.register = register;
        this.logged = logged;
    }

    /** Overdrawn: by how much the log is over the allocation; null where it is not. */
    record Part(
            String cooperative,
            String allocated,
            String logged,
            @Nullable String overdrawn) {}

    private record Share(long cooperativeId, String cooperative, long kilograms) {}

    /** By proposal: as it was allocated by hand, else by the rights as they are now. */
    Map<Long, List<Part>> ofProposals(long stockId, List<LimitFile> proposals) {
        Map<Long, List<AllocationView>> byHand = limits.allocationsOfStock(stockId);
        List<RightView> rights = register.rightsOfStock(stockId);
        Map<Integer, Map<Long, Double>> taken = new HashMap<>();
        Map<Long, List<Part>> parts = new HashMap<>();
        for (LimitFile file : proposals) {
            Map<Long, Double> kilograms =
                    taken.computeIfAbsent(file.limit().season(), season -> logged.loggedKilograms(stockId, season));
            List<AllocationView> hand = byHand.get(file.id());
            List<Share> shares = hand == null
                    ? byRights(file.limit(), rights)
                    : hand.stream()
                            .map(a -> new Share(a.cooperativeId(), a.cooperativeName(), a.amountKg()))
                            .toList();
            parts.put(
                    file.id(),
                    shares.stream()
                            .map(s -> part(s, kilograms.getOrDefault(s.cooperativeId, 0.0)))
                            .toList());
        }
        return parts;
    }

    private static List<Share> byRights(NewLimit limit, List<RightView> rights) {
        Double kilograms = limit.toBeLoggedKilograms();
        if (kilograms == null) {
            return List.of();
        }
        long[] parts = LimitArithmetic.allocate(
                kilograms, rights.stream().mapToDouble(RightView::sharePercent).toArray());
        return IntStream.range(0, parts.length)
                .mapToObj(i ->
                        new Share(rights.get(i).cooperativeId(), rights.get(i).cooperativeName(), parts[i]))
                .toList();
    }

    private static Part part(Share share, double taken) {
        return new Part(
                share.cooperative,
                kilograms(share.kilograms),
                kilograms(taken),
                Math.round(taken) > share.kilograms ? kilograms(taken - share.kilograms) : null);
    }

    /** Whole kilograms in full: three digits would hide what is counted here. */
    private static String kilograms(double kilograms) {
        return Figures.digits((double) Math.round(kilograms), DIGITS) + "\u00a0kg";
    }
}
