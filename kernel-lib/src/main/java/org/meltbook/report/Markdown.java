package org.meltbook.report;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Locale;
import java.util.Map;
import java.util.Set;
import org.commonmark.Extension;
import org.commonmark.ext.gfm.tables.TablesExtension;
import org.commonmark.node.AbstractVisitor;
import org.commonmark.node.Code;
import org.commonmark.node.CustomNode;
import org.commonmark.node.Heading;
import org.commonmark.node.Image;
import org.commonmark.node.Node;
import org.commonmark.node.Paragraph;
import org.commonmark.node.SoftLineBreak;
import org.commonmark.node.Text;
import org.commonmark.parser.Parser;
import org.commonmark.renderer.NodeRenderer;
import org.commonmark.renderer.html.HtmlNodeRendererContext;
import org.commonmark.renderer.html.HtmlRenderer;
import org.commonmark.renderer.html.HtmlWriter;

/**
 * Turns the markdown of one document into HTML: CommonMark with tables and formulas. Markup in the text is shown, not
 * obeyed; headings get anchors that are unique in the document; a picture that is not part of the text becomes a link,
 * so that opening a page fetches nothing.
 */
public final class Markdown {
    private static final List<Extension> EXTENSIONS = List.of(TablesExtension.create(), new FormulaSyntax());
    private static final Parser PARSER = Parser.builder().extensions(EXTENSIONS).build();

    private final Formulas formulas;
    private final List<String> problems = new ArrayList<>();
    private final Map<String, Integer> anchors = new HashMap<>();
    private final HtmlRenderer renderer = HtmlRenderer.builder()
            .extensions(List.of(TablesExtension.create()))
            .escapeHtml(true)
            .sanitizeUrls(true)
            .attributeProviderFactory(context -> this::attributes)
            .nodeRendererFactory(Special::new)
            .build();

    /** A new document, whose formulas are set by {@code formulas}. */
    public Markdown(Formulas formulas) {
        this.formulas = formulas;
    }

    /** The HTML of the next piece of the document. */
    public String html(String markdown) {
        return renderer.render(PARSER.parse(markdown));
    }

    /** What could not be shown as it was meant, in the order of the text. */
    public List<String> problems() {
        return List.copyOf(problems);
    }

    /** The first heading of the text, without markup; empty if there is none. */
    public static String heading(String markdown) {
        return first(markdown, Heading.class);
    }

    /** The first sentence of the first paragraph of the text, without markup; empty if there is none. */
    public static String firstSentence(String markdown) {
        String paragraph = first(markdown, Paragraph.class);
        int end = paragraph.indexOf(". ");
        return end < 0 ? paragraph : paragraph.substring(0, end + 1);
    }

    private static String first(String markdown, Class<? extends Node> kind) {
        for (Node node = PARSER.parse(markdown).getFirstChild(); node != null; node = node.getNext()) {
            if (kind.isInstance(node)) {
                return words(node);
            }
        }
        return "";
    }

    private static String words(Node node) {
        StringBuilder words = new StringBuilder();
        node.accept(new AbstractVisitor() {
            @Override
            public void visit(Text text) {
                words.append(text.getLiteral());
            }

            @Override
            public void visit(Code code) {
                words.append(code.getLiteral());
            }

            @Override
            public void visit(SoftLineBreak lineBreak) {
                words.append(' ');
            }

            @Override
            public void visit(CustomNode custom) {
                if (custom instanceof FormulaSyntax.Inline formula) {
                    words.append(formula.tex());
                }
            }
        });
        return words.toString().strip();
    }

    private void attributes(Node node, String tag, Map<String, String> attributes) {
        if (node instanceof Heading) {
            attributes.put("id", anchor(words(node)));
        } else if (tag.equals("th")) {
            attributes.put("scope", "col");
        }
    }

    private String anchor(String heading) {
        String slug = heading.toLowerCase(Locale.ROOT)
                .replaceAll("[^\\p{L}\\p{N}]+", "-")
                .replaceAll("^-|-$", "");
        String base = slug.isEmpty() ? "section" : slug;
        int count = anchors.merge(base, 1, Integer::sum);
        return count == 1 ? base : base + "-" + count;
    }

    /** Formulas and pictures, which are not shown the usual way. */
    private final class Special implements NodeRenderer {
        private final HtmlNodeRendererContext context;
        private final HtmlWriter writer;

        Special(HtmlNodeRendererContext context) {
            this.context = context;
            this.writer = context.getWriter();
        }

        @Override
        public Set<Class<? extends Node>> getNodeTypes() {
            return Set.of(FormulaSyntax.Inline.class, FormulaSyntax.Display.class, Image.class);
        }

        @Override
        public void render(Node node) {
            if (node instanceof FormulaSyntax.Inline formula) {
                writer.raw(set(formula.tex(), formula.display()));
            } else if (node instanceof FormulaSyntax.Display formula) {
                writer.line();
                writer.raw(set(formula.tex(), true));
                writer.line();
            } else {
                picture((Image) node);
            }
        }

        private String set(String tex, boolean display) {
            Formulas.Setting setting = formulas.set(tex, display);
            setting.problem().ifPresent(problems::add);
            return setting.html();
        }

        private void picture(Image image) {
            String target = image.getDestination();
            if (target.startsWith("data:image/")) {
                writer.tag("img", Map.of("src", target, "alt", words(image)), true);
                return;
            }
            problems.add("picture not in the page, shown as a link: " + target);
            String safe = context.urlSanitizer().sanitizeImageUrl(target);
            writer.tag("a", Map.of("href", context.encodeUrl(safe)));
            writer.text("picture: " + (words(image).isEmpty() ? target : words(image)));
            writer.tag("/a");
        }
    }
}
