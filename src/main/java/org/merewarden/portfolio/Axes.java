package org.merewarden.portfolio;

import java.util.Locale;
import java.util.stream.Stream;
import org.jspecify.annotations.Nullable;

/** What the two axes of an equilibrium diagram count. */
enum Axes {
    /** Catch as a share of the median MSY, biomass as a share of the median K. */
    SHARE {
        @Override
        double catchFactor(StockCurve curve) {
            return 1 / curve.law().msy();
        }

        @Override
        double biomassFactor(StockCurve curve) {
            return 1 / curve.law().capacityTonnes();
        }
    },
    /** Both in kg per hectare of the register's area. */
    HECTARE {
        @Override
        double catchFactor(StockCurve curve) {
            return 1000 / curve.entry().stock().areaHectares();
        }

        @Override
        double biomassFactor(StockCurve curve) {
            return catchFactor(curve);
        }
    },
    /** Both in t. */
    ABSOLUTE {
        @Override
        double catchFactor(StockCurve curve) {
            return 1;
        }

        @Override
        double biomassFactor(StockCurve curve) {
            return 1;
        }
    };

    /** Diagram units per t a year. */
    abstract double catchFactor(StockCurve curve);

    /** Diagram units per t. */
    abstract double biomassFactor(StockCurve curve);

    String key() {
        return name().toLowerCase(Locale.ROOT);
    }

    /** SHARE where the key names none. */
    static Axes of(@Nullable String key) {
        return Stream.of(values()).filter(a -> a.key().equals(key)).findFirst().orElse(SHARE);
    }
}
