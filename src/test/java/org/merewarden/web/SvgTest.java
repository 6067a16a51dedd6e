package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.StringReader;
import java.util.List;
import javax.xml.parsers.DocumentBuilderFactory;
import org.junit.jupiter.api.Test;
import org.w3c.dom.Element;
import org.w3c.dom.NodeList;
import org.xml.sax.InputSource;

class SvgTest {
    @Test
    void aThirdOfTheLimitFillsAThirdOfTheBar() throws Exception {
        Element svg = parsed(Svg.barToLimit(4, 12, "4 t of 12 t"));
        assertThat(number(only(svg, "fill"), "width")).isEqualTo(40);
        assertThat(number(only(svg, "tick"), "x1")).isEqualTo(119);
        assertThat(ofClass(svg, "over")).isZero();
    }

    @Test
    void whatIsOverTheLimitStandsBehindItsTick() throws Exception {
        Element svg = parsed(Svg.barToLimit(15, 12, "15 t of 12 t"));
        assertThat(number(only(svg, "tick"), "x1")).isEqualTo(96);
        assertThat(number(only(svg, "fill"), "width")).isEqualTo(96);
        assertThat(number(only(svg, "over"), "width")).isEqualTo(24);
    }

    @Test
    void aLimitOfNothingAndNothingTakenIsAnEmptyBar() throws Exception {
        Element svg = parsed(Svg.barToLimit(0, 0, "closed"));
        assertThat(number(only(svg, "fill"), "width")).isZero();
    }

    @Test
    void theMarginGoesToBothSidesOfItsMiddle() throws Exception {
        Element plus = parsed(Svg.barAboutZero(0.25, 0.5, "margin"));
        assertThat(number(only(plus, "fill"), "x")).isEqualTo(60);
        assertThat(number(only(plus, "fill"), "width")).isEqualTo(30);
        Element minus = parsed(Svg.barAboutZero(-0.75, 0.5, "margin"));
        assertThat(number(only(minus, "below"), "x")).isEqualTo(0);
        assertThat(number(only(minus, "below"), "width")).isEqualTo(60);
        assertThat(ofClass(parsed(Svg.barAboutZero(Double.NaN, 0.5, "margin")), "fill"))
                .isZero();
    }

    @Test
    void theLineRunsFromLeftToRightBetweenZeroAndTheTop() throws Exception {
        Element svg = parsed(
                Svg.lineWithBand(List.of(1.0, 2.0), List.of(0.0, 1.0), List.of(2.0, 4.0), 1.0, "biomass against BMSY"));
        assertThat(only(svg, "path").getAttribute("points")).isEqualTo("2.0,11.5 118.0,8.0");
        assertThat(only(svg, "band").getAttribute("points")).isEqualTo("2.0,8.0 118.0,1.0 118.0,11.5 2.0,15.0");
        assertThat(number(only(svg, "level"), "y1")).isEqualTo(11.5);
    }

    @Test
    void everyDrawingIsOneImageWithItsTextEscaped() throws Exception {
        Element svg = parsed(Svg.barToLimit(1, 2, "<b>\"1\" & 2</b>"));
        assertThat(svg.getAttribute("role")).isEqualTo("img");
        assertThat(svg.getElementsByTagName("title").item(0).getTextContent()).isEqualTo("<b>\"1\" & 2</b>");
        assertThat(svg.hasAttribute("style")).isFalse();
    }

    @Test
    void aBandOfAnotherLengthIsRefusedWithItsLengths() {
        assertThatThrownBy(() -> Svg.lineWithBand(List.of(1.0, 2.0), List.of(1.0), List.of(1.0, 2.0), null, "x"))
                .hasMessageContaining("2, 1, 2");
    }

    private static Element parsed(String svg) throws Exception {
        return DocumentBuilderFactory.newInstance()
                .newDocumentBuilder()
                .parse(new InputSource(new StringReader(svg.replace("&quot;", "&#34;"))))
                .getDocumentElement();
    }

    private static Element only(Element svg, String kind) {
        assertThat(ofClass(svg, kind)).as(kind).isEqualTo(1);
        NodeList all = svg.getElementsByTagName("*");
        for (int i = 0; i < all.getLength(); i++) {
            if (((Element) all.item(i)).getAttribute("class").equals(kind)) {
                return (Element) all.item(i);
            }
        }
        throw new AssertionError(kind);
    }

    private static long ofClass(Element svg, String kind) {
        NodeList all = svg.getElementsByTagName("*");
        long found = 0;
        for (int i = 0; i < all.getLength(); i++) {
            found += ((Element) all.item(i)).getAttribute("class").equals(kind) ? 1 : 0;
        }
        return found;
    }

    private static double number(Element element, String attribute) {
        return Double.parseDouble(element.getAttribute(attribute));
    }

    @Test
    void beforeAndAfterShareALogarithmicAxisAboutTheMiddleBefore() {
        String svg = Svg.beforeAndAfter(new Svg.Range(1, 10, 100), new Svg.Range(10, 31.6228, 2000), 100, "MSY");
        // the picture is 120 wide: two powers of ten to each side of 60
        assertThat(svg)
                .contains("class=\"before\" x1=\"30.0\" y1=\"8.0\" x2=\"90.0\"")
                .contains("class=\"after\" x1=\"60.0\" y1=\"8.0\" x2=\"120.0\"")
                .contains("cx=\"75.0\"")
                .contains("<title>MSY</title>");
    }
}
