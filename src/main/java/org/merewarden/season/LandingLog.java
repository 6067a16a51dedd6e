package org.merewarden.season;

import java.time.Clock;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.stream.IntStream;
import org.merewarden.account.People;
import org.merewarden.activity.ActivityLog;
import org.merewarden.advice.ClosedLimits;
import org.merewarden.advice.Limits;
import org.merewarden.intake.Problem;
import org.merewarden.season.LandingStore.Act;
import org.merewarden.season.LandingStore.Origin;
import org.merewarden.waterbody.Register;
import org.merewarden.web.Seasons;
import org.merewarden.web.Who;
import org.springframework.dao.DuplicateKeyException;
import org.springframework.stereotype.Service;
import org.springframework.transaction.support.TransactionTemplate;

/**
 * Adds to the log. What is answered as stored has been committed. The key of an entry makes sending it again harmless:
 * the same content under the same key gets the same answer, other content is refused.
 */
@Service
class LandingLog {
    static final int MAX_LINES = 30;
    /** Keys that begin so are made here; no sender may use them. */
    static final String OWN_KEYS = "~";

    private final LandingStore store;
    private final Register register;
    private final Limits limits;
    private final ClosedLimits closed;
    private final Seasons seasons;
    private final People people;
    private final ActivityLog activity;
    private final TransactionTemplate transaction;
    private final Clock clock;

    LandingLog(
            LandingStore store,
            Register register,
            Limits limits,
            ClosedLimits closed,
            Seasons seasons,
            People people,
            ActivityLog activity,
            TransactionTemplate transaction,
            Clock clock) {
        this.store = store;
        this.register = register;
        this.limits = limits;
        this.closed = closed;
        this.seasons = seasons;
        this.people = people;
        this.activity = activity;
        this.transaction = transaction;
        this.clock = clock;
    }

    /** What became of a sending. */
    enum Result {
        STORED,
        /** the same was stored before; nothing changed */
        ALREADY,
        /** the key stands for something else */
        CONFLICT,
        REFUSED
    }

    /**
     * @param rows what is stored under the keys sent
     * @param problems for each entry in order, empty lists where there are none
     */
    record Outcome(Result result, List<LandingRow> rows, List<List<Problem>> problems) {}

    /** The key of a line of a form. */
    static String lineKey(String formKey, int line) {
        return OWN_KEYS + formKey + "/" + line;
    }

    /** The lines that one sending of a form stored, in order. */
    List<LandingRow> ofForm(String formKey) {
        return store
                .byKeys(IntStream.rangeClosed(1, MAX_LINES)
                        .mapToObj(line -> lineKey(formKey, line))
                        .toList())
                .stream()
                .sorted(Comparator.comparingLong(LandingRow::id))
                .toList();
    }

    /**
     * Stores all entries of a form or none.
     *
     * @param entries under {@link #lineKey} 1, 2, …
     */
    Outcome log(String formKey, List<Entry> entries) {
        List<LandingRow> before = ofForm(formKey);
        if (!before.isEmpty()) {
            return again(before, entries);
        }
        EntryRules rules = rules();
        List<List<Problem>> problems = new ArrayList<>();
        entries.forEach(entry -> problems.add(problems(rules, entry)));
        if (problems.stream().anyMatch(p -> !p.isEmpty())) {
            return new Outcome(Result.REFUSED, List.of(), problems);
        }
        List<Checked> rows = entries.stream().map(rules::check).toList();
        return insertOnce(
                rows,
                Act.LANDING,
                () -> {},
                Result.STORED,
                () -> ofForm(formKey),
                () -> again(ofForm(formKey), entries));
    }

    /**
     * Puts an entry in the place of a row; the row stays. Sent again with the same key it changes nothing; a row that is
     * already replaced or withdrawn by something else gives CONFLICT with the row that stands now.
     */
    Outcome correct(LandingRow of, Entry entry, String reason) {
        List<LandingRow> before = store.byKeys(List.of(entry.key()));
        if (!before.isEmpty()) {
            return again(before, List.of(entry));
        }
        if (of.correctedBy() != null || of.withdrawal()) {
            return conflict(of);
        }
        EntryRules rules = rules();
        rules.replaces(of);
        List<Problem> problems = problems(rules, entry);
        if (!people.mayLogAt(of.entry().lake())) {
            problems.add(0, notAssigned(of.entry().lake()));
        }
        if (!problems.isEmpty()) {
            return new Outcome(Result.REFUSED, List.of(), List.of(problems));
        }
        return insertOnce(
                List.of(rules.check(entry)),
                new Act("correction", of, reason),
                () -> record("corrected landing", of, entry.text() + "; reason: " + reason),
                Result.STORED,
                () -> store.byKeys(List.of(entry.key())),
                () -> conflict(of));
    }

    /** Takes a row out of the count; the row stays. Withdrawing twice is the same as once. */
    Outcome withdraw(LandingRow of, String reason) {
        String key = OWN_KEYS + "withdrawn/" + of.id();
        List<LandingRow> before = store.byKeys(List.of(key));
        if (!before.isEmpty()) {
            return new Outcome(Result.ALREADY, before, List.of());
        }
        if (of.correctedBy() != null || of.withdrawal()) {
            return conflict(of);
        }
        if (!people.mayLogAt(of.entry().lake())) {
            return new Outcome(
                    Result.REFUSED,
                    List.of(),
                    List.of(List.of(notAssigned(of.entry().lake()))));
        }
        return insertOnce(
                List.of(withdrawal(of, key)),
                new Act("withdrawal", of, reason),
                () -> record("withdrew landing", of, "withdrawn; reason: " + reason),
                Result.STORED,
                () -> store.byKeys(List.of(key)),
                () -> conflict(of));
    }

    Optional<LandingRow> find(long id) {
        return store.find(id);
    }

    /** A concurrent sender may have come first: then the unique key speaks, and its row is the answer. */
    private Outcome insertOnce(
            List<Checked> rows,
            Act act,
            Runnable alongside,
            Result result,
            java.util.function.Supplier<List<LandingRow>> stored,
            java.util.function.Supplier<Outcome> lost) {
        try {
            transaction.executeWithoutResult(status -> {
                store.insert(rows, act, new Origin(null, clock.instant(), Who.name()));
                alongside.run();
            });
        } catch (DuplicateKeyException e) {
            return lost.get();
        }
        return new Outcome(result, stored.get(), List.of());
    }

    private static Outcome again(List<LandingRow> stored, List<Entry> sent) {
        boolean same = stored.stream().map(LandingRow::entry).toList().equals(sent);
        return new Outcome(same ? Result.ALREADY : Result.CONFLICT, stored, List.of());
    }

    private Outcome conflict(LandingRow of) {
        List<LandingRow> history = store.histories(List.of(of.rootId()));
        return new Outcome(Result.CONFLICT, history.subList(history.size() - 1, history.size()), List.of());
    }

    private List<Problem> problems(EntryRules rules, Entry entry) {
        List<Problem> problems = rules.problems(entry);
        if (!people.mayLogAt(entry.lake())) {
            problems.add(notAssigned(entry.lake()));
        }
        return problems;
    }

    private static Problem notAssigned(String lake) {
        return new Problem("water_body", lake, "is not among the waters assigned to you; ask the administrator");
    }

    private EntryRules rules() {
        return new EntryRules(register, seasons, new References.OneByOne(register, limits, closed, store));
    }

    /** The same fish under a key of its own; weights and flags as they were, so that the log shows what was taken out. */
    private static Checked withdrawal(LandingRow of, String key) {
        Entry e = of.entry();
        Entry copy = new Entry(
                key,
                e.landedOn(),
                e.slip(),
                e.lake(),
                e.species(),
                e.population(),
                e.cooperative(),
                e.sector(),
                e.gear(),
                e.nets(),
                e.nights(),
                e.weightKg(),
                e.presentation(),
                e.number(),
                e.fate(),
                e.place(),
                e.note());
        return new Checked(
                copy,
                of.season(),
                of.waterBodyId(),
                of.stockId(),
                of.cooperativeId(),
                of.factor(),
                of.liveWeightKg(),
                of.flags());
    }

    private void record(String action, LandingRow of, String after) {
        activity.record(
                action,
                "Landing " + of.id() + " at " + of.entry().lake(),
                of.entry().text(),
                after);
    }
}
