package org.merewarden.waterbody;

import java.util.Map;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.Cells;
import org.merewarden.web.NotFound;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;
import org.springframework.validation.Errors;

/**
 * Changes to water bodies, stocks and cooperatives made by people. Codes and species never change: addresses, notices and
 * evidence hang on them. Where errors were found nothing is stored.
 */
@Service
@Transactional
class RegisterDesk {
    private final WaterBodies waterBodies;
    private final Stocks stocks;
    private final Cooperatives cooperatives;
    private final Register register;
    private final ActivityLog log;

    RegisterDesk(
            WaterBodies waterBodies, Stocks stocks, Cooperatives cooperatives, Register register, ActivityLog log) {
        this.waterBodies = waterBodies;
        this.stocks = stocks;
        this.cooperatives = cooperatives;
        this.register = register;
        this.log = log;
    }

    @Transactional(readOnly = true)
    WaterBody waterBody(String code) {
        return waterBodies.findByDetailsCode(code).orElseThrow(() -> new NotFound("no water body “" + code + "”"));
    }

    @Transactional(readOnly = true)
    Stock stock(String lake, String speciesKey) {
        return register.stock(lake, speciesKey)
                .flatMap(view -> stocks.findById(view.id()))
                .orElseThrow(() -> new NotFound("no stock “" + speciesKey + "” in “" + lake + "”"));
    }

    @Transactional(readOnly = true)
    Cooperative cooperative(String code) {
        return cooperatives.findByDetailsCode(code).orElseThrow(() -> new NotFound("no cooperative “" + code + "”"));
    }

    void addWaterBody(WaterBodyDetails details, Errors errors) {
        taken(register.waterBody(details.code).isPresent(), "code", details.code, errors);
        checkDepths(details, errors);
        if (!errors.hasErrors()) {
            WaterBody made = new WaterBody();
            made.details = details;
            waterBodies.saveAndFlush(made);
            added("added water body", details.name, details.cells());
        }
    }

    void changeWaterBody(String code, int version, WaterBodyDetails details, Errors errors) {
        checkDepths(details, errors);
        WaterBody stored = waterBody(code);
        refuseStale(stored.version, version, stored.details.cells());
        if (!errors.hasErrors()) {
            changed("changed water body", stored.details.name, stored.details.cells(), details.cells());
            stored.details = details;
            waterBodies.saveAndFlush(stored);
        }
    }

    /** Adds a stock to the water and returns its part of the address. */
    void addStock(String lake, StockDetails details, Errors errors) {
        long lakeId = register.waterBody(lake)
                .orElseThrow(() -> new NotFound("no water body “" + lake + "”"))
                .id();
        if (register.species(details.species).isEmpty() && !errors.hasFieldErrors("species")) {
            errors.rejectValue("species", "form.species", new Object[] {details.species}, "unknown species");
        }
        taken(register.stock(lake, details.key()).isPresent(), "species", details.key(), errors);
        if (!errors.hasErrors()) {
            Stock made = new Stock();
            made.waterBodyId = lakeId;
            details.population = details.populationOrEmpty();
            made.details = details;
            stocks.saveAndFlush(made);
            added("added stock", lake + ":" + details.key(), details.cells());
        }
    }

    void changeStock(String lake, String speciesKey, int version, StockDetails details, Errors errors) {
        Stock stored = stock(lake, speciesKey);
        details.species = stored.details.species;
        details.population = stored.details.population;
        refuseStale(stored.version, version, stored.details.cells());
        if (!errors.hasErrors()) {
            changed("changed stock", lake + ":" + speciesKey, stored.details.cells(), details.cells());
            stored.details = details;
            stocks.saveAndFlush(stored);
        }
    }

    void addCooperative(CooperativeDetails details, Errors errors) {
        taken(register.cooperative(details.code).isPresent(), "code", details.code, errors);
        if (!errors.hasErrors()) {
            Cooperative made = new Cooperative();
            made.details = details;
            cooperatives.saveAndFlush(made);
            added("added cooperative", details.name, details.cells());
        }
    }

    void changeCooperative(String code, int version, CooperativeDetails details, Errors errors) {
        Cooperative stored = cooperative(code);
        refuseStale(stored.version, version, stored.details.cells());
        if (!errors.hasErrors()) {
            changed("changed cooperative", stored.details.name, stored.details.cells(), details.cells());
            stored.details = details;
            cooperatives.saveAndFlush(stored);
        }
    }

    private static void checkDepths(WaterBodyDetails details, Errors errors) {
        if (details.depthsDisagree()) {
            errors.rejectValue(
                    "meanDepthMetres",
                    "form.depths",
                    new Object[] {Cells.text(details.meanDepthMetres), Cells.text(details.maxDepthMetres)},
                    "deeper than the deepest point");
        }
    }

    private static void taken(boolean exists, String field, String value, Errors errors) {
        if (exists) {
            errors.rejectValue(field, "form.taken", new Object[] {value}, "is taken");
        }
    }

    private static void refuseStale(int stored, int seen, Map<String, @Nullable Object> cells) {
        if (stored != seen) {
            throw new Conflict(Cells.describe(cells), stored);
        }
    }

    private void added(String action, String subject, Map<String, @Nullable Object> cells) {
        log.record(action, subject, null, Cells.describe(cells));
    }

    private void changed(
            String action, String subject, Map<String, @Nullable Object> before, Map<String, @Nullable Object> after) {
        if (!Cells.changes(before, after).isEmpty()) {
            log.record(action, subject, Cells.describe(before), Cells.describe(after));
        }
    }
}
