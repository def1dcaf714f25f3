package org.meltbook.kernel;

import java.util.ArrayList;
import java.util.List;
import java.util.Optional;
import java.util.regex.Matcher;
import java.util.regex.Pattern;

/**
 * What a signature names, as far as it takes to find it in a source.
 *
 * @param type       the type's name: simple, nested with dots, or with its package
 * @param name       name of the member; empty for the type itself, {@code <init>} for a constructor
 * @param parameters simple names of the parameters' types; empty if it takes none, or is no method
 * @param method     whether the member is a method or constructor
 */
record Named(String type, String name, List<String> parameters, boolean method) {
    private static final String CONSTRUCTOR = "<init>";
    private static final Pattern CALL = Pattern.compile("(?:(.*)\\s)?([\\w.$]+)\\((.*)\\).*");
    private static final Pattern FIELD = Pattern.compile("(?:([\\w.$]+)\\.)?(\\w+):([\\w.$]+)");
    private static final Pattern TYPE = Pattern.compile("[\\w.$]+");

    /** Copies the list. */
    Named {
        parameters = List.copyOf(parameters);
    }

    /** Reads a signature as JShell writes it: a call, {@code field:type}, or a type with its package. */
    static Optional<Named> in(String signature) {
        String plain = withoutTypeArguments(signature);
        Matcher call = CALL.matcher(plain);
        if (call.matches()) {
            return Optional.of(call(call.group(1) != null, call.group(2), call.group(3)));
        }
        Matcher field = FIELD.matcher(plain);
        if (field.matches()) {
            boolean local = field.group(1) == null;
            return Optional.of(
                    local ? type(field.group(3)) : new Named(field.group(1), field.group(2), List.of(), false));
        }
        return TYPE.matcher(plain).matches() ? Optional.of(type(plain)) : Optional.empty();
    }

    /** The type in which the member stands. */
    Named owner() {
        return type(type);
    }

    boolean isConstructor() {
        return name.equals(CONSTRUCTOR);
    }

    /** The name of a type without package, outer type and type arguments. */
    static String simple(String type) {
        String plain = withoutTypeArguments(type).strip();
        return plain.substring(plain.lastIndexOf('.', plain.endsWith("...") ? plain.length() - 4 : plain.length()) + 1);
    }

    private static Named type(String name) {
        return new Named(name, "", List.of(), false);
    }

    private static Named call(boolean returns, String name, String parameters) {
        List<String> types = new ArrayList<>();
        for (String parameter : parameters.isBlank() ? new String[0] : parameters.split(",")) {
            String declared = parameter.strip();
            int space = declared.lastIndexOf(' ');
            types.add(simple(space < 0 ? declared : declared.substring(0, space)));
        }
        int dot = name.lastIndexOf('.');
        return returns && dot > 0
                ? new Named(name.substring(0, dot), name.substring(dot + 1), types, true)
                : new Named(name, CONSTRUCTOR, types, true);
    }

    private static String withoutTypeArguments(String signature) {
        StringBuilder plain = new StringBuilder();
        int depth = 0;
        for (char c : signature.toCharArray()) {
            depth += c == '<' ? 1 : 0;
            if (depth == 0) {
                plain.append(c);
            }
            depth -= c == '>' ? 1 : 0;
        }
        return plain.toString();
    }
}
