package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;

import java.util.List;
import org.junit.jupiter.api.Test;

class PlotTest {
    @Test
    void anAxisThatBeginsBelowZeroHasZeroInItsMiddle() {
        String svg = new Plot(168, 156, 2000, 2010, -3, 3)
                .dot(new Point(2000, -3), 1, true, "low")
                .dot(new Point(2005, 0), 1, true, "middle")
                .dot(new Point(2012, 9), 1, true, "beyond")
                .svg("Residuals", "Season", "sd", true);
        // 56 to the left, 12 to the right and on top, 44 below: a field of 100 by 100
        assertThat(svg)
                .contains("class=\"low\" cx=\"56.0\" cy=\"112.0\"")
                .contains("class=\"middle\" cx=\"106.0\" cy=\"62.0\"")
                .contains("class=\"beyond\" cx=\"156.0\" cy=\"12.0\"")
                .contains(">-2<")
                .contains(">2004<");
    }

    @Test
    void barsStandOnZero() {
        assertThat(new Plot(168, 156, 0, 10, 10).bar(5, 2, 10, "bar").svg("t", "x", "y", false))
                .contains("y=\"12.0\" width=\"20.0\" height=\"100.0\"");
    }

    @Test
    void namesAreEscaped() {
        assertThat(new Plot(168, 156, 0, 1, 1)
                        .labels(List.of(new Plot.Label(new Point(0.5, 0.5), "a<b", "line0")))
                        .svg("<t>", "x", "y", false))
                .contains("a&lt;b")
                .contains("<title>&lt;t&gt;</title>");
    }
}
