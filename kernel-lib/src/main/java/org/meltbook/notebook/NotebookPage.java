package org.meltbook.notebook;

import java.nio.charset.StandardCharsets;
import java.util.ArrayList;
import java.util.Base64;
import java.util.List;
import java.util.Map;
import org.meltbook.kernel.MimeBundle;
import org.meltbook.report.Block;
import org.meltbook.report.Formulas;
import org.meltbook.report.Markdown;
import org.meltbook.report.Page;

/**
 * The page of one notebook.
 *
 * @param title    its first heading, or the name of its file
 * @param sentence the first sentence of its prose
 * @param html     the whole page
 * @param problems what could not be shown as it was meant
 */
record NotebookPage(String title, String sentence, String html, List<String> problems) {
    private static final List<String> PICTURES = List.of("image/png", "image/jpeg", "image/svg+xml");

    static NotebookPage of(String name, Notebook notebook, String banner, Formulas formulas) {
        List<Block> blocks = new ArrayList<>();
        List<String> prose = new ArrayList<>();
        for (Notebook.Cell cell : notebook.cells()) {
            switch (cell.kind()) {
                case MARKDOWN -> {
                    prose.add(cell.source());
                    blocks.add(new Block.Prose(cell.source()));
                }
                case RAW -> blocks.add(new Block.Printed(cell.source(), Block.Kind.OUT));
                default -> {
                    blocks.add(new Block.Code(cell.source().stripTrailing(), cell.count()));
                    cell.outputs().forEach(output -> blocks.addAll(blocks(output)));
                }
            }
        }
        String title = first(prose.stream().map(Markdown::heading).toList(), name);
        String sentence = first(prose.stream().map(Markdown::firstSentence).toList(), "");
        Page.Rendered page = Page.of(title, banner, blocks, formulas);
        return new NotebookPage(title, sentence, page.html(), page.problems());
    }

    private static String first(List<String> texts, String otherwise) {
        return texts.stream().filter(text -> !text.isBlank()).findFirst().orElse(otherwise);
    }

    private static List<Block> blocks(Output output) {
        if (output instanceof Output.Stream stream) {
            boolean err = stream.name().equals("stderr");
            return List.of(new Block.Printed(stream.text(), err ? Block.Kind.ERR : Block.Kind.OUT));
        } else if (output instanceof Output.Failure failure) {
            return List.of(new Block.Printed(String.join("\n", failure.lines()), Block.Kind.FAILURE));
        }
        return value(((Output.Value) output).bundle());
    }

    /** The richest form that a page can hold. */
    private static List<Block> value(MimeBundle bundle) {
        Map<String, Object> data = bundle.data();
        if (data.get("text/html") instanceof String html) {
            return List.of(new Block.Rich(html));
        }
        for (String mime : PICTURES) {
            if (data.get(mime) instanceof String picture) {
                return List.of(picture(mime, picture, bundle));
            }
        }
        if (data.get("text/markdown") instanceof String markdown) {
            return List.of(new Block.Prose(markdown));
        }
        if (data.get("text/latex") instanceof String latex) {
            return List.of(new Block.Prose(latex));
        }
        return List.of(new Block.Printed(bundle.plainText(), Block.Kind.VALUE));
    }

    private static Block picture(String mime, String data, MimeBundle bundle) {
        boolean text = mime.equals("image/svg+xml");
        String base64 = text ? Base64.getEncoder().encodeToString(data.getBytes(StandardCharsets.UTF_8)) : data;
        int width = bundle.metadata().get(mime) instanceof Map<?, ?> size && size.get("width") instanceof Number n
                ? n.intValue()
                : 0;
        return new Block.Picture(mime, base64, bundle.plainText(), FigureData.captions(bundle), width);
    }
}
