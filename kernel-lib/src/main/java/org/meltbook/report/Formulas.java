package org.meltbook.report;

import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.LinkedHashMap;
import java.util.Map;
import java.util.Optional;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.w3c.dom.Element;
import org.w3c.dom.NodeList;
import uk.ac.ed.ph.snuggletex.SnuggleEngine;
import uk.ac.ed.ph.snuggletex.SnuggleInput;
import uk.ac.ed.ph.snuggletex.SnuggleSession;

/**
 * Sets formulas written in TeX as MathML, which browsers draw without a script. A formula that cannot be set is never
 * shown in part: it stays as its source, and the problem is told.
 */
public final class Formulas {
    /** Words of TeX that notebooks use and the library does not know, and what says the same. */
    private static final Map<String, String> SAME = sameWords();

    private static final Pattern WORD = Pattern.compile("\\\\([A-Za-z]+)");
    private static final Pattern PRIMES = Pattern.compile("(?<!\\\\)('+)");
    /** A word of style with its argument: braces around both keep the style from reaching what follows. */
    private static final Pattern STYLED = Pattern.compile("\\\\math(?:bf|rm|sf|it)\\{[^{}]*\\}");

    private static final Pattern BRACED = Pattern.compile("\\\\(?:mbox|textrm)\\{[^{}]*\\}");

    private final SnuggleEngine engine = new SnuggleEngine();

    /**
     * One formula, set.
     *
     * @param html    MathML, or the escaped source where it could not be set
     * @param problem why it could not be set; empty if it was
     */
    public record Setting(String html, Optional<String> problem) {}

    /** Sets {@code tex}, in the line or, if {@code display}, on a line of its own. */
    public Setting set(String tex, boolean display) {
        SnuggleSession session = engine.createSession();
        String fence = display ? "$$" : "$";
        try {
            session.parseInput(new SnuggleInput(fence + inKnownWords(tex) + fence));
        } catch (IOException e) {
            throw new UncheckedIOException("reading a formula from memory", e);
        }
        NodeList nodes = session.buildDOMSubtree();
        boolean one = nodes != null && nodes.getLength() == 1 && nodes.item(0) instanceof Element;
        if (!session.getErrors().isEmpty() || !one) {
            return refused(tex, display, session);
        }
        Element math = (Element) nodes.item(0);
        math.setAttribute("alttext", tex.strip());
        MathMl.repair(math);
        return new Setting(MathMl.text(math), Optional.empty());
    }

    private static Setting refused(String tex, boolean display, SnuggleSession session) {
        String why = session.getErrors().stream()
                .map(error -> switch (error.getErrorCode().toString()) {
                    case "TTEC00" -> "unknown command \\" + error.getArguments()[0];
                    default -> "not well-formed (" + error.getErrorCode() + ")";
                })
                .findFirst()
                .orElse("not one formula");
        String tag = display ? "div" : "span";
        String html = "<" + tag + " class=\"unset\" title=\"formula not set: " + Html.escape(why) + "\"><code>"
                + Html.escape(tex.strip()) + "</code></" + tag + ">";
        return new Setting(html, Optional.of("formula not set, " + why + ": " + tex.strip()));
    }

    private static String inKnownWords(String tex) {
        String words =
                WORD.matcher(tex).replaceAll(m -> Matcher.quoteReplacement(SAME.getOrDefault(m.group(1), m.group())));
        words = STYLED.matcher(words).replaceAll(m -> Matcher.quoteReplacement("{" + m.group() + "}"));
        StringBuilder text = new StringBuilder();
        Matcher braced = BRACED.matcher(words);
        int from = 0;
        while (braced.find()) {
            text.append(primesIn(words.substring(from, braced.start()))).append(braced.group());
            from = braced.end();
        }
        return text.append(primesIn(words.substring(from))).toString();
    }

    private static String primesIn(String tex) {
        return PRIMES.matcher(tex)
                .replaceAll(m -> Matcher.quoteReplacement(
                        "^{" + "\\prime".repeat(m.group().length()) + "}"));
    }

    private static Map<String, String> sameWords() {
        Map<String, String> words = new LinkedHashMap<>();
        words.put("to", "\\rightarrow");
        words.put("tfrac", "\\frac");
        words.put("dfrac", "\\frac");
        words.put("boldsymbol", "\\mathbf");
        words.put("bm", "\\mathbf");
        words.put("operatorname", "\\mathrm");
        words.put("text", "\\mbox");
        words.put("lvert", "|");
        words.put("rvert", "|");
        words.put("le", "\\leq");
        words.put("ge", "\\geq");
        return words;
    }
}
