package org.meltbook.report;

import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.TreeMap;
import org.w3c.dom.Element;
import org.w3c.dom.NamedNodeMap;
import org.w3c.dom.Node;

/**
 * Brings MathML of the older kind to what browsers draw (MathML Core): fences as operators, upright and bold letters
 * marked on each letter, accents and minus signs as their own characters.
 */
final class MathMl {
    private static final Map<String, String> CHARACTERS = Map.of(
            "\u0307", "\u02D9", "\u0308", "\u00A8", "\u0302", "^", "\u0303", "~", "\u20D7", "\u2192", "-", "\u2212");
    private static final Set<String> FUNCTIONS = Set.of(
            "sin", "cos", "tan", "sinh", "cosh", "tanh", "arctan", "ln", "log", "exp", "max", "min", "lim", "tr",
            "det");
    private static final Set<String> TALL = Set.of("mfrac", "mtable", "munder", "munderover", "msqrt", "mroot");
    private static final int PRIME = '\u2032';
    private static final String THIN = "0.167em";

    private MathMl() {}

    /** Changes the tree below {@code node} in place. */
    static void repair(Node node) {
        for (Node child : children(node)) {
            repair(child);
        }
        if (!(node instanceof Element element)) {
            return;
        }
        switch (name(element)) {
            case "mfenced" -> fence(element);
            case "mstyle" -> style(element);
            case "mo", "mn" -> characters(element);
            case "mi" -> function(element);
            case "msup", "msubsup" -> prime(element);
            default -> {}
        }
    }

    /** The tree as text. */
    static String text(Node node) {
        if (!(node instanceof Element element)) {
            return Html.escape(node.getTextContent());
        }
        StringBuilder text = new StringBuilder("<").append(name(element));
        attributes(element).forEach((key, value) -> text.append(' ')
                .append(key)
                .append("=\"")
                .append(Html.escape(value))
                .append('"'));
        text.append('>');
        children(element).forEach(child -> text.append(text(child)));
        return text.append("</").append(name(element)).append('>').toString();
    }

    /** {@code mfenced} was dropped from browsers, and with it the brackets: they become operators in a row. */
    private static void fence(Element fenced) {
        Element row = make(fenced, "mrow", "");
        List<Element> tall = new ArrayList<>();
        TALL.forEach(name -> collect(fenced, name, tall));
        operator(row, fenced.getAttribute("open"), "prefix", !tall.isEmpty());
        boolean first = true;
        for (Node child : children(fenced)) {
            if (!first) {
                row.appendChild(make(fenced, "mo", ","));
            }
            row.appendChild(child);
            first = false;
        }
        operator(row, fenced.getAttribute("close"), "postfix", !tall.isEmpty());
        fenced.getParentNode().replaceChild(row, fenced);
    }

    private static void operator(Element row, String text, String form, boolean tall) {
        if (text.isEmpty()) {
            return;
        }
        Element operator = make(row, "mo", text);
        operator.setAttribute("fence", "true");
        operator.setAttribute("form", form);
        if (!tall) {
            // Around letters a bracket of letter height looks right; browsers would take the next larger one.
            operator.setAttribute("stretchy", "false");
        }
        row.appendChild(operator);
    }

    /** Browsers no longer hand {@code mathvariant} down: each letter says it, and upright letters join to words. */
    private static void style(Element style) {
        String variant = style.getAttribute("mathvariant");
        Element row = make(style, "mrow", "");
        Element word = null;
        for (Node child : children(style)) {
            boolean letter = child instanceof Element e && name(e).equals("mi");
            if (letter && variant.equals("normal") && word != null) {
                word.setTextContent(word.getTextContent() + child.getTextContent());
                continue;
            }
            row.appendChild(child);
            word = letter ? (Element) child : null;
        }
        List<Element> letters = new ArrayList<>();
        collect(row, "mi", letters);
        letters.forEach(letter -> {
            letter.setAttribute("mathvariant", "normal");
            switch (variant) {
                case "bold" -> letter.setAttribute("style", "font-weight:bold");
                case "sans-serif" -> letter.setAttribute("style", "font-family:sans-serif");
                default -> {}
            }
        });
        style.getParentNode().replaceChild(row, style);
    }

    private static void characters(Element element) {
        String text = element.getTextContent();
        if (CHARACTERS.containsKey(text)) {
            element.setTextContent(CHARACTERS.get(text));
        } else if (name(element).equals("mn") && text.startsWith("-")) {
            element.setTextContent("\u2212" + text.substring(1));
        }
    }

    /** Primes are letters at full height, as in print: as exponents browsers make them too small to see. */
    private static void prime(Element power) {
        List<Node> parts = children(power);
        int count = (int) parts.get(parts.size() - 1)
                .getTextContent()
                .codePoints()
                .filter(c -> c == PRIME)
                .count();
        if (count == 0
                || count > 3
                || parts.get(parts.size() - 1).getTextContent().length() != count) {
            return;
        }
        Element mark = make(power, "mo", "\u2032\u2033\u2034".substring(count - 1, count));
        mark.setAttribute("lspace", "0");
        mark.setAttribute("rspace", "0");
        Element row = make(power, "mrow", "");
        row.appendChild(parts.get(0));
        row.appendChild(mark);
        Element whole = row;
        if (parts.size() == 3) {
            whole = make(power, "msub", "");
            whole.appendChild(row);
            whole.appendChild(parts.get(1));
        }
        power.getParentNode().replaceChild(whole, power);
    }

    /** A function's name stands apart from what it is taken of: tan δ. */
    private static void function(Element element) {
        Node next = element.getNextSibling();
        boolean row = Set.of("mrow", "math")
                .contains(element.getParentNode().getNodeName().replaceFirst(".*:", ""));
        if (row
                && FUNCTIONS.contains(element.getTextContent())
                && next instanceof Element follower
                && !Set.of("mfenced", "mo").contains(name(follower))) {
            Element space = make(element, "mspace", "");
            space.setAttribute("width", THIN);
            element.getParentNode().insertBefore(space, next);
        }
    }

    private static void collect(Node node, String name, List<Element> found) {
        for (Node child : children(node)) {
            if (child instanceof Element element && name(element).equals(name)) {
                found.add(element);
            }
            collect(child, name, found);
        }
    }

    private static Element make(Node near, String name, String text) {
        Element element = near.getOwnerDocument().createElementNS(near.getNamespaceURI(), name);
        element.setTextContent(text);
        return element;
    }

    private static String name(Element element) {
        return element.getLocalName() == null ? element.getNodeName() : element.getLocalName();
    }

    private static List<Node> children(Node node) {
        List<Node> children = new ArrayList<>();
        for (Node child = node.getFirstChild(); child != null; child = child.getNextSibling()) {
            children.add(child);
        }
        return children;
    }

    private static Map<String, String> attributes(Element element) {
        Map<String, String> sorted = new TreeMap<>();
        NamedNodeMap attributes = element.getAttributes();
        for (int i = 0; i < attributes.getLength(); i++) {
            if (!attributes.item(i).getNodeName().startsWith("xmlns")) {
                sorted.put(attributes.item(i).getNodeName(), attributes.item(i).getNodeValue());
            }
        }
        return sorted;
    }
}
