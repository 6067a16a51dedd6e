package org.merewarden;

import java.awt.Rectangle;
import java.awt.image.BufferedImage;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashSet;
import java.util.List;
import java.util.Set;
import java.util.function.Consumer;
import javax.imageio.ImageIO;
import org.apache.pdfbox.Loader;
import org.apache.pdfbox.cos.COSName;
import org.apache.pdfbox.pdmodel.PDDocument;
import org.apache.pdfbox.pdmodel.PDPage;
import org.apache.pdfbox.pdmodel.PDResources;
import org.apache.pdfbox.pdmodel.documentinterchange.logicalstructure.PDStructureElement;
import org.apache.pdfbox.pdmodel.documentinterchange.logicalstructure.PDStructureNode;
import org.apache.pdfbox.pdmodel.font.PDFont;
import org.apache.pdfbox.pdmodel.graphics.form.PDFormXObject;
import org.apache.pdfbox.rendering.PDFRenderer;
import org.apache.pdfbox.text.PDFTextStripper;

/** A PDF file read back. */
public final class Paper implements AutoCloseable {
    private static final int DOTS_PER_INCH = 100;
    private static final int WHITE = 0xffffff;

    private final PDDocument document;

    public Paper(byte[] file) throws IOException {
        document = Loader.loadPDF(file);
    }

    public int pages() {
        return document.getNumberOfPages();
    }

    public String title() {
        return document.getDocumentInformation().getTitle();
    }

    public String language() {
        return document.getDocumentCatalog().getLanguage();
    }

    public boolean marked() {
        return document.getDocumentCatalog().getMarkInfo() != null
                && document.getDocumentCatalog().getMarkInfo().isMarked();
    }

    /** What it says, blanks and line ends as single blanks. */
    public String text() throws IOException {
        return squeezed(new PDFTextStripper().getText(document));
    }

    /** @param page from 1 */
    public String text(int page) throws IOException {
        PDFTextStripper stripper = new PDFTextStripper();
        stripper.setStartPage(page);
        stripper.setEndPage(page);
        return squeezed(stripper.getText(document));
    }

    private static String squeezed(String text) {
        return text.replaceAll("[\\s\\u00a0]+", " ");
    }

    /** The texts that stand for pictures. */
    public List<String> alternatives() {
        List<String> texts = new ArrayList<>();
        walk(document.getDocumentCatalog().getStructureTreeRoot(), element -> {
            if (element.getAlternateDescription() != null) {
                texts.add(element.getAlternateDescription());
            }
        });
        return texts;
    }

    /** The types of structure elements in reading order, from the document's root down. */
    public List<String> tags() {
        List<String> tags = new ArrayList<>();
        walk(document.getDocumentCatalog().getStructureTreeRoot(), element -> tags.add(element.getStructureType()));
        return tags;
    }

    private static void walk(PDStructureNode node, Consumer<PDStructureElement> each) {
        for (Object kid : node.getKids()) {
            if (kid instanceof PDStructureElement element) {
                each.accept(element);
                walk(element, each);
            }
        }
    }

    /** Names of all fonts used, those not embedded with an exclamation mark before them. */
    public Set<String> fonts() throws IOException {
        Set<String> fonts = new HashSet<>();
        for (PDPage page : document.getPages()) {
            fonts(page.getResources(), fonts);
        }
        return fonts;
    }

    private static void fonts(PDResources resources, Set<String> fonts) throws IOException {
        for (COSName name : resources.getFontNames()) {
            PDFont font = resources.getFont(name);
            fonts.add((font.isEmbedded() ? "" : "!") + font.getName().replaceFirst("^[A-Z]{6}\\+", ""));
        }
        for (COSName name : resources.getXObjectNames()) {
            if (resources.getXObject(name) instanceof PDFormXObject form && form.getResources() != null) {
                fonts(form.getResources(), fonts);
            }
        }
    }

    /** A page as a picture, left in target/screenshots for people to look at. */
    public BufferedImage picture(int page, String name) throws IOException {
        BufferedImage image = new PDFRenderer(document).renderImageWithDPI(page - 1, DOTS_PER_INCH);
        Path folder = Files.createDirectories(Path.of("target", "screenshots"));
        ImageIO.write(image, "png", folder.resolve(name + "-" + page + ".png").toFile());
        return image;
    }

    /** The smallest rectangle in mm that holds all that is not white; empty on a blank page. */
    public static Rectangle ink(BufferedImage image) {
        Rectangle ink = new Rectangle(-1, -1);
        for (int y = 0; y < image.getHeight(); y++) {
            for (int x = 0; x < image.getWidth(); x++) {
                if ((image.getRGB(x, y) & WHITE) != WHITE) {
                    ink.add(new Rectangle(x, y, 1, 1));
                }
            }
        }
        double mm = 25.4 / DOTS_PER_INCH;
        return new Rectangle(
                (int) Math.floor(ink.x * mm), (int) Math.floor(ink.y * mm), (int) Math.ceil(ink.width * mm), (int)
                        Math.ceil(ink.height * mm));
    }

    @Override
    public void close() {
        try {
            document.close();
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }
}
