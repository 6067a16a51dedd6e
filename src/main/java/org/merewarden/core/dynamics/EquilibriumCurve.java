package org.merewarden.core.dynamics;

import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.OptionalDouble;
import java.util.TreeSet;
import java.util.function.DoubleUnaryOperator;
import org.apache.commons.math3.analysis.solvers.BrentSolver;

/**
 * The equilibria of a growth law under a harvest rule, over the harvest:
 *
 * <pre>
 *   u*(B) = g(B)/φ(B)   where φ &gt; 0 and g ≥ 0
 *   stable where du*&#47;dB &lt; 0, fold where du*&#47;dB changes its sign
 *   λ(B) = g′(B) − u φ′(B) = φ(B) du*&#47;dB
 * </pre>
 *
 * <p>Run along B from 1e-12 K to K, so folds need no continuation. Folds come from Brent's method on g′φ − gφ′, which has
 * the sign of du*&#47;dB; a kink of the rule at which that sign jumps is a fold as well. Curves may have any number of folds
 * and gaps.
 *
 * <p>Edge cases: the empty lake, B = 0, is not on the curve although it is an equilibrium wherever φ(0) = 0, and the end
 * of a stock wherever φ(0) &gt; 0. Constant effort has no fold under surplus production: the equilibrium slides to zero at
 * F = g′(0). A harvest within 1e-12 of a fold's counts as the fold's.
 *
 * <p>Accuracy: folds and equilibria to about 1e-12 relative. Two folds inside one cell of the grid (B/K from (i/N)² to
 * ((i+1)/N)², N = 512 unless told) are not seen.
 */
public final class EquilibriumCurve {
    /**
     * A point of the curve.
     *
     * @param harvest u, in the rule's unit, ≥ 0
     * @param biomassTonnes B in t
     */
    public record Point(double harvest, double biomassTonnes) {}

    /**
     * A stretch of the curve on which u*(B) only rises or only falls.
     *
     * @param stable whether its equilibria are stable (u* falls)
     * @param points in order of biomass, at least two; next to a zero of φ the harvest may be very large
     */
    public record Branch(boolean stable, List<Point> points) {
        public Branch {
            points = List.copyOf(points);
        }
    }

    /**
     * Where two branches meet.
     *
     * @param harvest u, in the rule's unit
     * @param biomassTonnes B in t
     * @param maximum true where a rising harvest ends the branches, false where a falling one does
     */
    public record Fold(double harvest, double biomassTonnes, boolean maximum) {}

    private static final int DEFAULT_CELLS = 512;

    private static final double LOWEST_STATE = 1e-12;

    /** Share of a cell by which its ends are drawn in, so that each side of a kink is seen with its own slope. */
    private static final double INSET = 1e-9;

    private static final double SAME_HARVEST = 1e-12;

    private static final int MOST_EVALUATIONS = 500;

    private final GrowthLaw law;

    private final HarvestRule rule;

    private final List<Branch> branches = new ArrayList<>();

    private final List<Fold> folds = new ArrayList<>();

    private EquilibriumCurve(GrowthLaw law, HarvestRule rule, int cells) {
        this.law = law;
        this.rule = rule;
        collect(monotoneNodes(cells));
    }

    /** Traces the curve on 512 cells. */
    public static EquilibriumCurve trace(GrowthLaw law, HarvestRule rule) {
        return trace(law, rule, DEFAULT_CELLS);
    }

    /** Traces the curve on a grid of the given number of cells, ≥ 2. */
    public static EquilibriumCurve trace(GrowthLaw law, HarvestRule rule, int cells) {
        Require.less("1", 1, "cells", cells);
        return new EquilibriumCurve(law, rule, cells);
    }

    /** The branches, from low biomass to high. */
    public List<Branch> branches() {
        return List.copyOf(branches);
    }

    /** The folds, from low biomass to high. */
    public List<Fold> folds() {
        return List.copyOf(folds);
    }

    /**
     * The harvest at which the upper stable branch ends: the maximum of u* at the highest biomass. Under a constant catch
     * it is MSY. Empty where no rising harvest meets a fold.
     */
    public OptionalDouble foldHarvest() {
        return folds.stream().filter(Fold::maximum).mapToDouble(Fold::harvest).reduce((lower, upper) -> upper);
    }

    /** All equilibria with B &gt; 0 at a harvest u ≥ 0, from low biomass to high; a fold counts once, as not stable. */
    public List<Equilibrium> equilibria(double harvest) {
        Require.notNegative("harvest", harvest);
        List<Equilibrium> found = new ArrayList<>();
        for (Fold fold : folds) {
            if (same(harvest, fold.harvest())) {
                found.add(new Equilibrium(harvest, fold.biomassTonnes(), 0, false));
            }
        }
        for (Branch branch : branches) {
            findOn(branch, harvest).ifPresent(biomass -> found.add(equilibrium(harvest, biomass, branch.stable())));
        }
        found.sort(Comparator.comparingDouble(Equilibrium::biomassTonnes));
        return found;
    }

    /**
     * The biomass in t below which, at this harvest, the stock no longer returns to its upper branch: the highest
     * equilibrium that is not stable. Empty where there is none: no such biomass, or a harvest beyond the fold.
     */
    public OptionalDouble tippingBiomass(double harvest) {
        return equilibria(harvest).stream()
                .filter(equilibrium -> !equilibrium.stable())
                .mapToDouble(Equilibrium::biomassTonnes)
                .max();
    }

    private Equilibrium equilibrium(double harvest, double biomass, boolean stable) {
        return new Equilibrium(harvest, biomass, law.slope(biomass) - harvest * rule.slope(biomass), stable);
    }

    private OptionalDouble findOn(Branch branch, double harvest) {
        List<Point> points = branch.points();
        if (isFold(points.get(0), harvest) || isFold(points.get(points.size() - 1), harvest)) {
            return OptionalDouble.empty();
        }
        for (int i = 1; i < points.size(); i++) {
            double below = points.get(i - 1).harvest() - harvest;
            double above = points.get(i).harvest() - harvest;
            if (below == 0) {
                return OptionalDouble.of(points.get(i - 1).biomassTonnes());
            }
            if (above == 0) {
                return OptionalDouble.of(points.get(i).biomassTonnes());
            }
            if (below < 0 != above < 0) {
                double low = points.get(i - 1).biomassTonnes();
                return OptionalDouble.of(
                        root(b -> harvestAt(b) - harvest, low, points.get(i).biomassTonnes()));
            }
        }
        return OptionalDouble.empty();
    }

    private boolean isFold(Point end, double harvest) {
        return same(harvest, end.harvest())
                && folds.stream().anyMatch(fold -> fold.biomassTonnes() == end.biomassTonnes());
    }

    private static boolean same(double harvest, double other) {
        return Math.abs(harvest - other) <= SAME_HARVEST * other;
    }

    /** Nodes such that between two neighbours u* is smooth, monotone and of one sign. */
    private TreeSet<Double> monotoneNodes(int cells) {
        TreeSet<Double> nodes = new TreeSet<>();
        double capacity = law.capacity();
        nodes.add(LOWEST_STATE * capacity);
        for (int i = 1; i <= cells; i++) {
            double share = (double) i / cells;
            nodes.add(share * share * capacity);
        }
        for (double kink : rule.kinks()) {
            if (kink > LOWEST_STATE * capacity && kink < capacity) {
                nodes.add(kink);
            }
        }
        addRoots(nodes, law::rate);
        addRoots(nodes, this::tendency);
        return nodes;
    }

    private static void addRoots(TreeSet<Double> nodes, DoubleUnaryOperator function) {
        List<Double> roots = new ArrayList<>();
        double low = nodes.first();
        for (double high : nodes.tailSet(low, false)) {
            double inset = INSET * (high - low);
            double first = function.applyAsDouble(low + inset);
            double last = function.applyAsDouble(high - inset);
            if (first * last < 0) {
                roots.add(root(function, low + inset, high - inset));
            }
            low = high;
        }
        nodes.addAll(roots);
    }

    /** g′φ − gφ′, with the sign of du*&#47;dB. */
    private double tendency(double biomass) {
        return law.slope(biomass) * rule.effect(biomass) - law.rate(biomass) * rule.slope(biomass);
    }

    private double harvestAt(double biomass) {
        return law.rate(biomass) / rule.effect(biomass);
    }

    private void collect(TreeSet<Double> nodes) {
        List<Point> points = new ArrayList<>();
        boolean falling = false;
        double low = nodes.first();
        for (double high : nodes.tailSet(low, false)) {
            double middle = low + (high - low) / 2;
            boolean onCurve = rule.effect(middle) > 0 && law.rate(middle) > 0;
            boolean falls = tendency(middle) < 0;
            if (!points.isEmpty() && (!onCurve || falls != falling)) {
                branches.add(new Branch(falling, points));
                points.clear();
                if (onCurve) {
                    folds.add(new Fold(harvestAt(low), low, falls));
                }
            }
            if (onCurve) {
                if (points.isEmpty()) {
                    points.add(end(low, high));
                }
                points.add(end(high, low));
            }
            falling = falls;
            low = high;
        }
        if (!points.isEmpty()) {
            branches.add(new Branch(falling, points));
        }
    }

    /** The curve at a node, drawn towards its neighbour where φ is zero at the node itself. */
    private Point end(double node, double neighbour) {
        double biomass = rule.effect(node) > 0 ? node : node + INSET * (neighbour - node);
        return new Point(Math.max(0, harvestAt(biomass)), biomass);
    }

    private static double root(DoubleUnaryOperator function, double low, double high) {
        BrentSolver brent = new BrentSolver(1e-15, 1e-16 * low, 0);
        return brent.solve(MOST_EVALUATIONS, function::applyAsDouble, low, high);
    }
}
