package org.meltbook.kernel;

/** The text of one cell, with the questions that only its letters answer. */
record CellText(String text) {
    /** The line, counted from 1, of an offset. */
    int lineAt(int offset) {
        return 1
                + (int) text.substring(0, offset).chars().filter(c -> c == '\n').count();
    }

    /** The letters of a line, counted from 1, without its end. */
    String line(int number) {
        String[] lines = text.split("\n", -1);
        return number >= 1 && number <= lines.length ? lines[number - 1].stripTrailing() : "";
    }

    /** How many letters stand before an offset on its line. */
    int columnAt(int offset) {
        return offset - 1 - text.lastIndexOf('\n', offset - 1);
    }

    /** The same text with comments blanked and the insides of literals hidden; every offset stays where it was. */
    static String masked(String text) {
        StringBuilder masked = new StringBuilder(text);
        int at = 0;
        while (at < text.length()) {
            int end = endOfComment(text, at);
            if (end > at) {
                blank(masked, at, end, ' ');
            } else {
                end = endOfLiteral(text, at);
                if (end > at + 1) {
                    blank(masked, at + 1, end - 1, '_');
                }
            }
            at = Math.max(end, at + 1);
        }
        return masked.toString();
    }

    /** Where the first letter stands that is neither blank nor comment; the length if there is none. */
    static int firstCode(String text) {
        String masked = masked(text);
        int at = 0;
        while (at < masked.length() && Character.isWhitespace(masked.charAt(at))) {
            at++;
        }
        return at;
    }

    /** Whether the last thing that is neither blank nor comment is a semicolon. */
    static boolean endsWithSemicolon(String text) {
        return masked(text).stripTrailing().endsWith(";");
    }

    /** Where a comment starts that has no end; -1 if there is none. */
    static int openComment(String text) {
        int at = 0;
        while (at < text.length()) {
            if (text.startsWith("/*", at) && text.indexOf("*/", at + 2) < 0) {
                return at;
            }
            int end = endOfComment(text, at);
            at = Math.max(end > at ? end : endOfLiteral(text, at), at + 1);
        }
        return -1;
    }

    private static int endOfComment(String text, int at) {
        if (text.startsWith("//", at)) {
            int end = text.indexOf('\n', at);
            return end < 0 ? text.length() : end;
        }
        if (text.startsWith("/*", at)) {
            int end = text.indexOf("*/", at + 2);
            return end < 0 ? text.length() : end + 2;
        }
        return at;
    }

    private static int endOfLiteral(String text, int at) {
        boolean block = text.startsWith("\"\"\"", at);
        String quote = block ? "\"\"\"" : text.substring(at, at + 1);
        if (!block && !quote.equals("\"") && !quote.equals("'")) {
            return at;
        }
        for (int i = at + quote.length(); i < text.length(); i++) {
            char c = text.charAt(i);
            if (c == '\\') {
                i++;
            } else if (text.startsWith(quote, i)) {
                return i + quote.length();
            } else if (c == '\n' && !block) {
                return i;
            }
        }
        return text.length();
    }

    private static void blank(StringBuilder text, int from, int to, char with) {
        for (int i = from; i < to; i++) {
            if (text.charAt(i) != '\n') {
                text.setCharAt(i, with);
            }
        }
    }
}
