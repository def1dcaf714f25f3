package org.meltbook.kernel;

import com.sun.source.doctree.DocCommentTree;
import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import jdk.jshell.JShell;
import jdk.jshell.SourceCodeAnalysis;
import jdk.jshell.SourceCodeAnalysis.Documentation;

/** Tells what is known of a name in a cell: signatures from the compiler, doc comments from the sources at hand. */
final class Inspection {
    private final SourceCodeAnalysis analysis;
    private final SourceComments comments;

    Inspection(JShell shell, ClassLoader classes) {
        analysis = shell.sourceCodeAnalysis();
        comments = new SourceComments(classes);
    }

    /** What is known of the name at, or just before, the cursor; of the call around it if there is no name. */
    Optional<MimeBundle> of(String cell, int cursor) {
        int end = cursor;
        while (end < cell.length() && Character.isJavaIdentifierPart(cell.charAt(end))) {
            end++;
        }
        String upTo = cell.substring(0, end);
        boolean called = cell.substring(end).stripLeading().startsWith("(");
        List<String> signatures = called ? signatures(upTo + "(") : signatures(upTo);
        if (signatures.isEmpty()) {
            signatures = called ? signatures(upTo) : signatures(upTo + "(");
        }
        return signatures.isEmpty() ? Optional.empty() : Optional.of(described(signatures));
    }

    private List<String> signatures(String code) {
        return analysis.documentation(code, code.length(), false).stream()
                .map(Documentation::signature)
                .distinct()
                .toList();
    }

    private MimeBundle described(List<String> signatures) {
        List<String> text = new ArrayList<>();
        StringBuilder html = new StringBuilder();
        for (String signature : signatures) {
            Optional<CommentText> comment = Named.in(signature).flatMap(this::comment);
            text.add(signature + comment.map(c -> "\n\n" + c.plain()).orElse(""));
            html.append("<pre>").append(CommentText.escaped(signature)).append("</pre>\n");
            comment.ifPresent(c -> html.append(c.html()));
        }
        Map<String, Object> forms = new LinkedHashMap<>();
        forms.put("text/plain", String.join("\n\n", text));
        forms.put("text/html", html.toString());
        return MimeBundle.of(forms);
    }

    private Optional<CommentText> comment(Named named) {
        Optional<DocCommentTree> own = comments.of(named);
        if (own.isPresent()) {
            return own.map(CommentText::of);
        }
        // The parts of a record, and its constructor, are told in the comment of the record.
        return comments.of(named.owner())
                .map(CommentText::of)
                .flatMap(record -> named.isConstructor() ? Optional.of(record) : record.part(named.name()));
    }
}
