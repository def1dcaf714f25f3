package org.meltbook.report;

import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.nio.charset.StandardCharsets;
import java.util.Base64;
import java.util.List;
import java.util.Locale;
import java.util.Objects;

/**
 * A page of HTML that stands for itself: styles inside, pictures inside, no script, and a policy that keeps the browser
 * from fetching anything or running what a result may have brought along.
 */
public final class Page {
    private static final String POLICY = "default-src 'none'; img-src data:; style-src 'unsafe-inline'; font-src data:";

    private Page() {}

    /**
     * A finished page.
     *
     * @param html     the whole document
     * @param problems what could not be shown as it was meant; the page marks these places too
     */
    public record Rendered(String html, List<String> problems) {
        /** Copies the list. */
        public Rendered {
            problems = List.copyOf(problems);
        }
    }

    /**
     * The page with the given blocks.
     *
     * @param title  what the browser shows as its title
     * @param banner a line above everything, such as that the run failed; blank for none
     */
    public static Rendered of(String title, String banner, List<Block> blocks, Formulas formulas) {
        Markdown markdown = new Markdown(formulas);
        StringBuilder body = new StringBuilder("<main>\n");
        if (!banner.isBlank()) {
            body.append("<p class=\"banner\" role=\"status\">")
                    .append(Html.escape(banner))
                    .append("</p>\n");
        }
        blocks.forEach(block -> body.append(html(block, markdown)));
        body.append("</main>\n");
        return new Rendered(document(title, body.toString()), markdown.problems());
    }

    /** A whole document around a body. */
    static String document(String title, String body) {
        return "<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n"
                + "<meta http-equiv=\"Content-Security-Policy\" content=\"" + POLICY + "\">\n"
                + "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n"
                + "<meta name=\"color-scheme\" content=\"light dark\">\n"
                + "<title>" + Html.escape(title) + "</title>\n<style>\n" + style(body.contains("<math"))
                + "</style>\n</head>\n<body>\n" + body + "</body>\n</html>\n";
    }

    private static String html(Block block, Markdown markdown) {
        if (block instanceof Block.Prose prose) {
            return "<section class=\"prose\">\n" + markdown.html(prose.markdown()) + "</section>\n";
        } else if (block instanceof Block.Code code) {
            String mark = code.count().map(n -> "In " + n).orElse("not run");
            return "<div class=\"code\"><span class=\"count\" aria-hidden=\"true\">" + mark
                    + "</span><pre><code class=\"language-java\">" + Html.escape(code.source())
                    + "</code></pre></div>\n";
        } else if (block instanceof Block.Printed printed) {
            String kind = printed.kind().name().toLowerCase(Locale.ROOT);
            return "<pre class=\"printed " + kind + "\">"
                    + Html.escape(printed.text().stripTrailing()) + "</pre>\n";
        } else if (block instanceof Block.Rich rich) {
            return "<div class=\"rich\">\n" + rich.html().stripTrailing() + "\n</div>\n";
        }
        return picture((Block.Picture) block);
    }

    private static String picture(Block.Picture picture) {
        String width = picture.width() > 0 ? " width=\"" + picture.width() + "\"" : "";
        String caption =
                picture.caption().isBlank() ? "" : "<figcaption>" + Html.escape(picture.caption()) + "</figcaption>";
        return "<figure class=\"picture\"><img src=\"data:" + Html.escape(picture.mime()) + ";base64,"
                + Html.escape(picture.base64().replaceAll("\\s", "")) + "\" alt=\"" + Html.escape(picture.text())
                + "\"" + width + ">" + caption + "</figure>\n";
    }

    /** The style sheet; the font for formulas comes along only where there is one. */
    private static String style(boolean formulas) {
        String sheet = new String(resource("page.css"), StandardCharsets.UTF_8);
        return formulas
                ? "@font-face { font-family: \"Meltbook Formula\"; src: url(data:font/woff2;base64,"
                        + Base64.getEncoder().encodeToString(resource("formula.woff2")) + ") format(\"woff2\"); }\n"
                        + sheet
                : sheet;
    }

    private static byte[] resource(String name) {
        try (InputStream in = Objects.requireNonNull(Page.class.getResourceAsStream(name), name)) {
            return in.readAllBytes();
        } catch (IOException e) {
            throw new UncheckedIOException("reading " + name + " from the program itself", e);
        }
    }
}
