package org.merewarden.waterbody;

import java.util.function.Predicate;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;
import org.merewarden.intake.Batch;
import org.merewarden.intake.Problem;
import org.merewarden.intake.TableRow;

/** What speaks against a row of the register, beyond what its columns say of themselves; nulls are to be skipped. */
final class RegisterRules {
    private RegisterRules() {}

    static Stream<@Nullable Problem> waterBody(TableRow row) {
        return Stream.of(Slug.problem("code", row.need("code")), depths(WaterBodyDetails.of(row)));
    }

    /** @param known whether there is such a species code */
    static Stream<@Nullable Problem> stock(
            TableRow row, StockReferences references, Batch batch, Predicate<String> known) {
        return Stream.of(references.lakeProblem(row, batch), species(row, known), population(row));
    }

    private static @Nullable Problem depths(WaterBodyDetails details) {
        return details.depthsDisagree()
                ? new Problem(
                        "mean_depth_m",
                        String.valueOf(details.meanDepthMetres),
                        "the mean depth may not exceed max_depth_m, " + details.maxDepthMetres + " m")
                : null;
    }

    /** Why the species is unknown, or null. */
    static @Nullable Problem species(TableRow row, Predicate<String> known) {
        String code = row.textOrEmpty("species");
        return known.test(code)
                ? null
                : new Problem(
                        "species",
                        code,
                        "no species has the code “" + code + "”; use a three-letter code of the FAO list, in capitals");
    }

    private static @Nullable Problem population(TableRow row) {
        String population = row.textOrEmpty("population");
        return population.matches("[a-z0-9-]{0,40}")
                ? null
                : new Problem(
                        "population",
                        population,
                        "stands in addresses and needs lower-case letters, digits and hyphens, 40 at most");
    }
}
