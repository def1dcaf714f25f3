package org.meltbook.report;

import java.util.ArrayList;
import java.util.List;
import java.util.Set;
import java.util.stream.Collectors;
import org.commonmark.node.Block;
import org.commonmark.node.CustomBlock;
import org.commonmark.node.CustomNode;
import org.commonmark.parser.Parser;
import org.commonmark.parser.SourceLine;
import org.commonmark.parser.beta.InlineContentParser;
import org.commonmark.parser.beta.InlineContentParserFactory;
import org.commonmark.parser.beta.InlineParserState;
import org.commonmark.parser.beta.ParsedInline;
import org.commonmark.parser.beta.Position;
import org.commonmark.parser.beta.Scanner;
import org.commonmark.parser.block.AbstractBlockParser;
import org.commonmark.parser.block.AbstractBlockParserFactory;
import org.commonmark.parser.block.BlockContinue;
import org.commonmark.parser.block.BlockStart;
import org.commonmark.parser.block.MatchedBlockParser;
import org.commonmark.parser.block.ParserState;

/**
 * Formulas in markdown as notebooks write them: {@code $…$} in the line, {@code $$…$$} on lines of their own. A dollar
 * followed by a space, or a closing one followed by a digit, is money.
 */
final class FormulaSyntax implements Parser.ParserExtension {
    private static final String FENCE = "$$";
    private static final char CODE = '`';

    /** A formula in the line. */
    static final class Inline extends CustomNode {
        private final String tex;
        private final boolean display;

        Inline(String tex, boolean display) {
            this.tex = tex;
            this.display = display;
        }

        String tex() {
            return tex;
        }

        boolean display() {
            return display;
        }
    }

    /** A formula on lines of its own. */
    static final class Display extends CustomBlock {
        private String tex = "";

        String tex() {
            return tex;
        }
    }

    @Override
    public void extend(Parser.Builder builder) {
        builder.customInlineContentParserFactory(new DollarFactory());
        builder.customBlockParserFactory(new FenceFactory());
    }

    private static final class DollarFactory implements InlineContentParserFactory {
        @Override
        public Set<Character> getTriggerCharacters() {
            return Set.of('$');
        }

        @Override
        public InlineContentParser create() {
            return new Dollar();
        }
    }

    private static final class Dollar implements InlineContentParser {
        @Override
        public ParsedInline tryParse(InlineParserState state) {
            Scanner scanner = state.scanner();
            int fence = scanner.matchMultiple('$');
            Position start = scanner.position();
            boolean opens = fence <= 2 && scanner.hasNext() && (fence == 2 || !Character.isWhitespace(scanner.peek()));
            return opens ? close(scanner, start, fence) : ParsedInline.none();
        }

        private static ParsedInline close(Scanner scanner, Position start, int fence) {
            while (scanner.find('$') >= 0) {
                Position end = scanner.position();
                int before = scanner.peekPreviousCodePoint();
                int found = scanner.matchMultiple('$');
                if (before == '\\') {
                    continue;
                }
                boolean digit = scanner.hasNext() && Character.isDigit(scanner.peek());
                boolean closes = found == fence && (fence == 2 || !Character.isWhitespace(before) && !digit);
                String tex = scanner.getSource(start, end).getContent();
                return closes && !tex.isBlank() && tex.indexOf(CODE) < 0
                        ? ParsedInline.of(new Inline(tex, fence == 2), scanner.position())
                        : ParsedInline.none();
            }
            return ParsedInline.none();
        }
    }

    private static final class FenceFactory extends AbstractBlockParserFactory {
        @Override
        public BlockStart tryStart(ParserState state, MatchedBlockParser matched) {
            String line = state.getLine().getContent().toString();
            int start = state.getNextNonSpaceIndex();
            if (state.getIndent() >= 4 || !line.startsWith(FENCE, start)) {
                return BlockStart.none();
            }
            String rest = line.substring(start + FENCE.length()).stripTrailing();
            if (rest.contains(FENCE) && !rest.endsWith(FENCE)) {
                return BlockStart.none();
            }
            return BlockStart.of(new Fenced()).atIndex(start + FENCE.length());
        }
    }

    private static final class Fenced extends AbstractBlockParser {
        private final Display block = new Display();
        private final List<String> lines = new ArrayList<>();
        private boolean closed;

        @Override
        public Block getBlock() {
            return block;
        }

        @Override
        public BlockContinue tryContinue(ParserState state) {
            return closed ? BlockContinue.none() : BlockContinue.atIndex(state.getIndex());
        }

        @Override
        public void addLine(SourceLine line) {
            String text = line.getContent().toString().stripTrailing();
            closed = text.endsWith(FENCE);
            lines.add(closed ? text.substring(0, text.length() - FENCE.length()) : text);
        }

        @Override
        public void closeBlock() {
            block.tex = lines.stream().filter(line -> !line.isBlank()).collect(Collectors.joining("\n"));
        }
    }
}
