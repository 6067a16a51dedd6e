package org.merewarden.web;

import static org.assertj.core.api.Assertions.assertThat;
import static org.mockito.Mockito.mock;
import static org.mockito.Mockito.when;

import com.sun.net.httpserver.HttpServer;
import java.awt.image.BufferedImage;
import java.net.InetAddress;
import java.net.InetSocketAddress;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.concurrent.atomic.AtomicInteger;
import javax.imageio.ImageIO;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.Paper;
import org.thymeleaf.spring6.SpringTemplateEngine;
import org.thymeleaf.templateresolver.StringTemplateResolver;

class PdfPagesTest {
    private static final String PAGE =
            "<html lang=\"en\"><head><title>A page</title><meta name=\"subject\" content=\"s\"/>"
                    + "<style th:utext=\"${style}\"></style>%s</head><body><p th:text=\"${words}\">w</p>%s</body></html>";

    private static Paper paper(String head, String body, String words) throws Exception {
        SpringTemplateEngine templates = new SpringTemplateEngine();
        templates.setTemplateResolver(new StringTemplateResolver());
        PageFrame frame = mock(PageFrame.class);
        when(frame.bare()).thenReturn(new PageFrame.Frame("Office", false, null, null, List.of()));
        return new Paper(
                new PdfPages(templates, frame).make(PAGE.formatted(head, body), Map.of("words", words), Locale.UK));
    }

    @Test
    void nothingIsFetchedFromTheNetworkOrTheDisk(@TempDir Path folder) throws Exception {
        BufferedImage black = new BufferedImage(40, 40, BufferedImage.TYPE_INT_RGB);
        Path picture = folder.resolve("black.png");
        ImageIO.write(black, "png", picture.toFile());
        AtomicInteger asked = new AtomicInteger();
        HttpServer server = HttpServer.create(new InetSocketAddress(InetAddress.getLoopbackAddress(), 0), 0);
        server.createContext("/", exchange -> {
            asked.incrementAndGet();
            byte[] bytes = Files.readAllBytes(picture);
            exchange.sendResponseHeaders(200, bytes.length);
            exchange.getResponseBody().write(bytes);
            exchange.close();
        });
        server.start();
        try {
            String there = "http://" + server.getAddress().getAddress().getHostAddress() + ":"
                    + server.getAddress().getPort();
            String image = "<img alt=\"a\" src=\"%s\"/>";
            String drawing = "<svg xmlns=\"http://www.w3.org/2000/svg\" xmlns:xlink=\"http://www.w3.org/1999/xlink\""
                    + " width=\"40\" height=\"40\"><image width=\"40\" height=\"40\" xlink:href=\"%s\"/></svg>";
            try (Paper paper = paper(
                    "<link rel=\"stylesheet\" href=\"" + there + "/a.css\"/>",
                    image.formatted(there + "/a.png")
                            + image.formatted(picture.toUri())
                            + drawing.formatted(there + "/b.png")
                            + drawing.formatted(picture.toUri())
                            + "<p style=\"background: url(" + there + "/c.png)\">.</p>",
                    "")) {
                assertThat(asked).hasValue(0);
                assertThat(darkPixels(paper.picture(1, "paper-refusing"))).isLessThan(200);
            }
        } finally {
            server.stop(0);
        }
    }

    /** The picture has 40 × 40 CSS pixels, some 1,700 dots on paper. */
    private static long darkPixels(BufferedImage image) {
        long dark = 0;
        for (int y = 0; y < image.getHeight(); y++) {
            for (int x = 0; x < image.getWidth(); x++) {
                dark += (image.getRGB(x, y) & 0xff) < 160 ? 1 : 0;
            }
        }
        return dark;
    }

    @Test
    void drawingsHaveTheShippedFontAndStandInInk() throws Exception {
        Plot plot = new Plot(680, 300, 0, 10, 10).line(List.of(new Point(0, 1), new Point(10, 9)), "stable line0");
        try (Paper paper = paper(
                "", PdfPages.drawing(plot.svg("Title", "Catch, t", "Biomass, t", false), "A \"line\"", 120), "words")) {
            assertThat(paper.fonts()).containsExactly("DejaVuSans");
            assertThat(paper.alternatives()).containsExactly("A \"line\"");
            assertThat(darkPixels(paper.picture(1, "paper-drawing"))).isGreaterThan(500);
        }
    }

    @Test
    void noLineEndsInsideAWordWithAnApostrophe() throws Exception {
        try (Paper paper = paper("", "", "the cooperatives’ and the authority’s warnings ".repeat(40))) {
            assertThat(paper.text()).doesNotContain("’ s ");
            assertThat(paper.text().split("authority’s", -1)).hasSize(41);
        }
    }

    @Test
    void wordsOfUsersAreTextWhateverTheyHold() throws Exception {
        String words = "ź Ω ≤ − 10⁻⁵ “<b>” & \u0001 end";
        try (Paper paper = paper("", "", words)) {
            assertThat(paper.text()).contains("ź Ω ≤ − 10⁻⁵ “<b>” & \ufffd end");
            assertThat(paper.marked()).isTrue();
            assertThat(paper.title()).isEqualTo("A page");
        }
    }
}
