package org.meltbook.kernel;

import com.sun.source.doctree.AttributeTree;
import com.sun.source.doctree.DocCommentTree;
import com.sun.source.doctree.DocTree;
import com.sun.source.doctree.EndElementTree;
import com.sun.source.doctree.EntityTree;
import com.sun.source.doctree.LinkTree;
import com.sun.source.doctree.LiteralTree;
import com.sun.source.doctree.ParamTree;
import com.sun.source.doctree.ReturnTree;
import com.sun.source.doctree.SeeTree;
import com.sun.source.doctree.StartElementTree;
import com.sun.source.doctree.TextTree;
import com.sun.source.doctree.ThrowsTree;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;

/**
 * A doc comment to read: the description, then what is said of parameters, result and exceptions.
 *
 * @param description HTML of the description
 * @param parts       HTML by what it is about, in order: {@code rate}, {@code Returns}, {@code Throws UnitException}
 */
record CommentText(String description, Map<String, String> parts) {
    private static final Set<String> BREAKS = Set.of("p", "ul", "ol", "pre", "br", "dl", "table", "tr", "h2", "h3");
    private static final Set<String> KEPT = Set.of(
            "p", "ul", "ol", "li", "pre", "br", "b", "i", "em", "strong", "sub", "sup", "code", "dl", "dt", "dd",
            "table", "tr", "td", "th");

    static CommentText of(DocCommentTree comment) {
        Map<String, String> parts = new LinkedHashMap<>();
        for (DocTree tag : comment.getBlockTags()) {
            if (tag instanceof ParamTree param) {
                parts.put(param.getName().toString(), html(param.getDescription()));
            } else if (tag instanceof ReturnTree result) {
                parts.put("Returns", html(result.getDescription()));
            } else if (tag instanceof ThrowsTree thrown) {
                parts.put("Throws " + thrown.getExceptionName(), html(thrown.getDescription()));
            } else if (tag instanceof SeeTree see) {
                parts.put("See", html(see.getReference()));
            }
        }
        return new CommentText(html(comment.getFullBody()), parts);
    }

    /** What is said of one part, as a comment of its own. */
    Optional<CommentText> part(String name) {
        return Optional.ofNullable(parts.get(name)).map(text -> new CommentText(text, Map.of()));
    }

    /** The comment as plain text, paragraphs parted by an empty line. */
    String plain() {
        List<String> lines = new ArrayList<>();
        lines.add(plain(description));
        if (!parts.isEmpty()) {
            lines.add("");
        }
        parts.forEach((name, text) -> lines.add("  " + name + ": " + plain(text).replace("\n", "\n    ")));
        return String.join("\n", lines).strip();
    }

    /** The comment as HTML without links and styles. */
    String html() {
        StringBuilder html = new StringBuilder("<p>").append(description).append("</p>\n");
        if (!parts.isEmpty()) {
            html.append("<dl>\n");
            parts.forEach((name, text) -> html.append("<dt><b>")
                    .append(escaped(name))
                    .append("</b></dt><dd>")
                    .append(text)
                    .append("</dd>\n"));
            html.append("</dl>\n");
        }
        return html.toString();
    }

    static String escaped(String text) {
        return text.replace("&", "&amp;").replace("<", "&lt;").replace(">", "&gt;");
    }

    private static String html(List<? extends DocTree> trees) {
        StringBuilder html = new StringBuilder();
        for (DocTree tree : trees) {
            html.append(html(tree));
        }
        return html.toString().strip();
    }

    private static String html(DocTree tree) {
        if (tree instanceof TextTree text) {
            return escaped(text.getBody());
        }
        if (tree instanceof LiteralTree literal) {
            String body = escaped(literal.getBody().getBody());
            return literal.getKind() == DocTree.Kind.CODE ? "<code>" + body + "</code>" : body;
        }
        if (tree instanceof LinkTree link) {
            String shown =
                    link.getLabel().isEmpty() ? reference(link.getReference().getSignature()) : html(link.getLabel());
            return "<code>" + shown + "</code>";
        }
        if (tree instanceof StartElementTree start) {
            return element(start.getName().toString(), "<");
        }
        if (tree instanceof EndElementTree end) {
            return element(end.getName().toString(), "</");
        }
        if (tree instanceof EntityTree || tree instanceof AttributeTree) {
            return tree.toString();
        }
        return escaped(tree.toString());
    }

    private static String element(String name, String opening) {
        return KEPT.contains(name) ? opening + name + ">" : "";
    }

    /** {@code org.meltbook.base.Rows#titled} as one would say it: {@code Rows.titled}. */
    private static String reference(String signature) {
        String said = signature.replaceFirst("^#", "").replaceFirst("^([a-z][\\w]*\\.)+(?=[A-Z])", "");
        return escaped(said.replace('#', '.'));
    }

    private static String plain(String html) {
        String text = html.replaceAll("\\s+", " ");
        for (String name : BREAKS) {
            text = text.replaceAll(" ?<" + name + "> ?", "\n\n");
        }
        return text.replaceAll(" ?<li> ?", "\n- ")
                .replaceAll("<sup>", "^")
                .replaceAll("</?[a-z0-9]+>", "")
                .replace("&lt;", "<")
                .replace("&gt;", ">")
                .replace("&nbsp;", " ")
                .replace("&amp;", "&")
                .replaceAll("\n{3,}", "\n\n")
                .strip();
    }
}
