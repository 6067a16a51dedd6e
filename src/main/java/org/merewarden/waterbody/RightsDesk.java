package org.merewarden.waterbody;

import jakarta.validation.constraints.DecimalMax;
import jakarta.validation.constraints.DecimalMin;
import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import java.util.Objects;
import java.util.Optional;
import org.jspecify.annotations.Nullable;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.Cells;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;
import org.springframework.validation.Errors;

/** Shares of cooperatives in stocks, and dated weight factors, as people enter them. */
@Service
@Transactional
class RightsDesk {
    /** A share in one stock; 0 ends the right. */
    static class ShareForm {
        /** lake:species */
        @NotBlank(message = "{form.needed}")
        public String stock = "";

        @NotNull(message = "{form.needed}")
        @DecimalMin(value = "0", message = "{form.least}")
        @DecimalMax(value = "100", message = "{form.most}")
        public @Nullable Double sharePercent;
    }

    private final FishingRights rights;
    private final WeightConversions conversions;
    private final Register register;
    private final ActivityLog log;

    RightsDesk(FishingRights rights, WeightConversions conversions, Register register, ActivityLog log) {
        this.rights = rights;
        this.conversions = conversions;
        this.register = register;
        this.log = log;
    }

    void setShare(CooperativeView cooperative, ShareForm form, Errors errors) {
        Optional<StockView> stock = stock(form.stock);
        if (stock.isEmpty() && !errors.hasFieldErrors("stock")) {
            errors.rejectValue("stock", "form.stock", new Object[] {form.stock}, "unknown stock");
        }
        if (errors.hasErrors() || stock.isEmpty()) {
            return;
        }
        double share = Objects.requireNonNull(form.sharePercent);
        double total = share + othersShares(cooperative, stock.get());
        if (Shares.tooMuch(total)) {
            errors.rejectValue(
                    "sharePercent",
                    "form.shares",
                    new Object[] {stock.get().title(), Shares.percent(total), Cells.plain(share)},
                    "more than 100 % in total");
            return;
        }
        store(cooperative, stock.get(), share);
    }

    private double othersShares(CooperativeView cooperative, StockView stock) {
        return rights.findByStockId(stock.id()).stream()
                .filter(r -> r.cooperativeId != cooperative.id())
                .mapToDouble(r -> r.sharePercent)
                .sum();
    }

    private void store(CooperativeView cooperative, StockView stock, double share) {
        FishingRight right = rights.findByCooperativeIdAndStockId(cooperative.id(), stock.id())
                .orElseGet(FishingRight::new);
        String before = right.id == null ? null : Cells.plain(right.sharePercent) + " %";
        if (share == 0) {
            if (right.id == null) {
                return;
            }
            rights.delete(right);
            rights.flush();
        } else {
            right.cooperativeId = cooperative.id();
            right.stockId = stock.id();
            right.sharePercent = share;
            rights.saveAndFlush(right);
        }
        log.record(
                share == 0 ? "ended right" : "set right",
                cooperative.name() + ", " + stock.title(),
                before,
                share == 0 ? null : Cells.plain(share) + " %");
    }

    private Optional<StockView> stock(String key) {
        int colon = key.indexOf(':');
        return colon < 0 ? Optional.empty() : register.stock(key.substring(0, colon), key.substring(colon + 1));
    }

    void addConversion(ConversionDetails details, Errors errors) {
        if (register.species(details.species).isEmpty() && !errors.hasFieldErrors("species")) {
            errors.rejectValue("species", "form.species", new Object[] {details.species}, "unknown species");
        }
        if ("whole".equals(details.presentation)) {
            errors.rejectValue("presentation", "form.whole", "a whole fish weighs what it weighs");
        }
        if (!errors.hasErrors() && exists(details)) {
            errors.rejectValue("validFrom", "form.taken", new Object[] {details.validFrom}, "is taken");
        }
        if (!errors.hasErrors()) {
            WeightConversion made = new WeightConversion();
            made.details = details;
            conversions.saveAndFlush(made);
            log.record("added weight factor", details.key(), null, Cells.describe(details.cells()));
        }
    }

    private boolean exists(ConversionDetails details) {
        return conversions.existsByDetailsSpeciesAndDetailsPresentationAndDetailsValidFrom(
                details.species, details.presentation, Objects.requireNonNull(details.validFrom));
    }
}
