package org.merewarden.core.policy;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import java.util.stream.IntStream;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.EnumSource;
import org.merewarden.core.policy.ManagedStock.Knowledge;

/**
 * Does the default policy keep its own promise? Simulated stocks that start at or above B lim, managed for 30 seasons by
 * assess, advise, catch: the managed time is cut into windows of the policy's horizon, and of the windows that start at or
 * above B lim the part is counted in which B &lt; B lim at some season's end. It stands beside the tolerance.
 *
 * <p>Twenty stocks of each kind, or as many as the system property {@code trial.stocks} says; the crossings may not pass the
 * tolerance. Of 200 stocks 1.0 % of the windows crossed with thin evidence; if the windows of one stock were wholly
 * dependent, twenty stocks of that rate would pass the tolerance with probability 0.001 (binomial). Seeds are fixed. In the
 * group of the long calibrations.
 */
@Tag("calibration")
class ClosedLoopTest {
    private static final int STOCKS = Integer.getInteger("trial.stocks", 20);
    private static final int SEASONS = 30;

    /** What happened to one stock: windows that started sound, those with a crossing, seasons below and their catch. */
    private record Outcome(int windows, int crossings, int seasonsBelow, double catchOverMsy, int unsettled) {}

    @ParameterizedTest
    @EnumSource
    void crossingsStayWithinTheTolerance(Knowledge knowledge) {
        Policy policy = Policy.DEFAULT;
        List<Outcome> outcomes = IntStream.range(0, STOCKS)
                .parallel()
                .mapToObj(i -> outcome(policy, knowledge, 7_000_000L + 1000L * knowledge.ordinal() + i))
                .toList();
        int windows = outcomes.stream().mapToInt(Outcome::windows).sum();
        int crossings = outcomes.stream().mapToInt(Outcome::crossings).sum();
        System.out.printf(
                "%s, %d stocks: %d of %d windows of %d seasons with B < B lim (%.1f %%, tolerance %.0f %%); %.1f %% of"
                        + " seasons below; mean limit / MSY %.2f; assessments not settled %d of %d%n",
                knowledge,
                STOCKS,
                crossings,
                windows,
                policy.horizonYears(),
                100.0 * crossings / windows,
                100 * policy.tolerance(),
                100.0 * outcomes.stream().mapToInt(Outcome::seasonsBelow).sum() / STOCKS / SEASONS,
                outcomes.stream().mapToDouble(Outcome::catchOverMsy).average().orElseThrow(),
                outcomes.stream().mapToInt(Outcome::unsettled).sum(),
                STOCKS * SEASONS);
        assertThat(crossings).isLessThanOrEqualTo((int) Math.floor(policy.tolerance() * windows));
        // a rule that closed everything would keep its promise, too
        assertThat(outcomes.stream()
                        .mapToDouble(Outcome::catchOverMsy)
                        .average()
                        .orElseThrow())
                .isGreaterThan(0.2);
    }

    private static Outcome outcome(Policy policy, Knowledge knowledge, long seed) {
        ManagedStock stock =
                ManagedStock.startingAboveLimit(knowledge, policy, seed).manage(SEASONS);
        int horizon = policy.horizonYears();
        int windows = 0;
        int crossings = 0;
        for (int start = 0; start + horizon <= SEASONS; start += horizon) {
            if (stock.states().get(start) >= 1) {
                windows++;
                boolean crossed = stock.states().subList(start + 1, start + horizon + 1).stream()
                        .anyMatch(b -> b < 1);
                crossings += crossed ? 1 : 0;
            }
        }
        return new Outcome(
                windows,
                crossings,
                (int) stock.states().stream().skip(1).filter(b -> b < 1).count(),
                stock.limits().stream().mapToDouble(l -> l).average().orElseThrow() / stock.msy(),
                stock.unsettled());
    }
}
