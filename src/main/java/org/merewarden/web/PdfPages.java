package org.merewarden.web;

import com.openhtmltopdf.extend.FSSupplier;
import com.openhtmltopdf.outputdevice.helper.BaseRendererBuilder.FSFontUseCase;
import com.openhtmltopdf.outputdevice.helper.BaseRendererBuilder.FontStyle;
import com.openhtmltopdf.outputdevice.helper.ExternalResourceControlPriority;
import com.openhtmltopdf.pdfboxout.PdfRendererBuilder;
import com.openhtmltopdf.svgsupport.BatikSVGDrawer;
import com.openhtmltopdf.util.Diagnostic;
import com.openhtmltopdf.util.XRLog;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.EnumSet;
import java.util.Locale;
import java.util.Map;
import java.util.logging.Level;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.slf4j.Logger;
import org.slf4j.LoggerFactory;
import org.springframework.core.io.ClassPathResource;
import org.springframework.http.ContentDisposition;
import org.springframework.http.HttpHeaders;
import org.springframework.http.MediaType;
import org.springframework.http.ResponseEntity;
import org.springframework.stereotype.Service;
import org.springframework.web.util.HtmlUtils;
import org.thymeleaf.ITemplateEngine;
import org.thymeleaf.context.Context;

/**
 * Pages on paper: a template of the layout {@code paper} as a tagged PDF (PDF/UA) on A4, its fonts embedded. Nothing is
 * fetched while it is made, neither from the network nor from the disk: the style is in the page, drawings are SVG in
 * the page. Templates are well-formed XML and hold no links of the application.
 */
@Service
public class PdfPages {
    private static final Logger log = LoggerFactory.getLogger(PdfPages.class);
    private static final String STYLE = read("static/css/paper.css");
    /** What no XML document may hold. */
    private static final Pattern NO_XML =
            Pattern.compile("[^\\x{9}\\x{A}\\x{D}\\x{20}-\\x{D7FF}\\x{E000}-\\x{FFFD}\\x{10000}-\\x{10FFFF}]");

    static {
        // each page else tells of its every step
        XRLog.listRegisteredLoggers().forEach(name -> XRLog.setLevel(name, Level.SEVERE));
    }

    private final ITemplateEngine templates;
    private final PageFrame frame;

    PdfPages(ITemplateEngine templates, PageFrame frame) {
        this.templates = templates;
        this.frame = frame;
    }

    /**
     * The finished file. Characters that XML cannot hold stand in it as the replacement character.
     *
     * @param model what the template names, beside {@code frame} and {@code style}
     * @throws UncheckedIOException if the page cannot be made
     */
    public byte[] make(String template, Map<String, Object> model, Locale locale) {
        Context context = new Context(locale, model);
        context.setVariable("frame", frame.bare());
        context.setVariable("style", STYLE);
        String page = templates.process(template, context);
        ByteArrayOutputStream file = new ByteArrayOutputStream();
        try (BatikSVGDrawer drawings = new BatikSVGDrawer()) {
            builder(NO_XML.matcher(page).replaceAll("\ufffd"), drawings, locale)
                    .toStream(file)
                    .run();
        } catch (IOException e) {
            throw new UncheckedIOException("PDF of " + template, e);
        }
        return file.toByteArray();
    }

    /**
     * A drawing as papers need it: without a style sheet of its own it is in ink, and it names its font and its text.
     *
     * @param svg a drawing of {@link Plot} or {@link Svg}
     */
    public static String drawing(String svg, String words, int widthMillimetres) {
        return svg.replaceFirst(
                "<svg ",
                Matcher.quoteReplacement("<svg alt=\"" + HtmlUtils.htmlEscape(words, "UTF-8")
                        + "\" font-family=\"DejaVu Sans\"" + " style=\"width: " + widthMillimetres + "mm\" "));
    }

    /** The file as an answer that browsers show. */
    public static ResponseEntity<byte[]> answer(String fileName, byte[] file) {
        return ResponseEntity.ok()
                .contentType(MediaType.APPLICATION_PDF)
                .header(
                        HttpHeaders.CONTENT_DISPOSITION,
                        ContentDisposition.inline()
                                .filename(fileName, StandardCharsets.UTF_8)
                                .build()
                                .toString())
                .body(file);
    }

    private static PdfRendererBuilder builder(String page, BatikSVGDrawer drawings, Locale locale) {
        PdfRendererBuilder builder = new PdfRendererBuilder()
                .withHtmlContent(page, null)
                .usePdfUaAccessibility(true)
                .withProducer("Merewarden")
                .useSVGDrawer(drawings)
                .useUnicodeLineBreaker(new WholeWords(locale))
                .useUriResolver((base, address) -> null)
                .withDiagnosticConsumer(PdfPages::tell);
        for (ExternalResourceControlPriority when : ExternalResourceControlPriority.values()) {
            builder.useExternalResourceAccessControl((address, kind) -> false, when);
        }
        font(builder, "fonts/DejaVuSans.ttf", 400);
        font(builder, "fonts/DejaVuSans-Bold.ttf", 700);
        return builder;
    }

    private static void tell(Diagnostic diagnostic) {
        if (diagnostic.getLevel().intValue() >= Level.WARNING.intValue()) {
            log.warn("{}", diagnostic.getFormattedMessage());
        }
    }

    private static void font(PdfRendererBuilder builder, String path, int weight) {
        FSSupplier<InputStream> font = () -> open(path);
        builder.useFont(
                font,
                "DejaVu Sans",
                weight,
                FontStyle.NORMAL,
                true,
                EnumSet.of(FSFontUseCase.DOCUMENT, FSFontUseCase.SVG));
    }

    private static String read(String path) {
        try (InputStream in = open(path)) {
            return new String(in.readAllBytes(), StandardCharsets.UTF_8);
        } catch (IOException e) {
            throw new UncheckedIOException(path, e);
        }
    }

    private static InputStream open(String path) {
        try {
            return new ClassPathResource(path).getInputStream();
        } catch (IOException e) {
            throw new UncheckedIOException(path, e);
        }
    }
}
