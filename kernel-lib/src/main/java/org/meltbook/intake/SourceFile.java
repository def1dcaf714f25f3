package org.meltbook.intake;

import java.io.BufferedInputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.InputStreamReader;
import java.io.OutputStream;
import java.io.Reader;
import java.io.UncheckedIOException;
import java.nio.charset.Charset;
import java.nio.charset.CodingErrorAction;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.security.DigestInputStream;
import java.security.MessageDigest;
import java.security.NoSuchAlgorithmException;
import java.util.HexFormat;
import java.util.stream.IntStream;

/** A text file that can be read more than once: its bytes, its encoding, its SHA-256. */
final class SourceFile {
    private static final int HEAD = 1 << 16;

    private final Path path;
    private final Charset charset;
    private final int mark;

    private SourceFile(Path path, Charset charset, int mark) {
        this.path = path;
        this.charset = charset;
        this.mark = mark;
    }

    /**
     * The file, with its encoding found from a byte order mark or else taken as UTF-8.
     *
     * @throws IntakeException if there is no such file, or it is a folder, empty, unreadable or binary
     */
    static SourceFile of(Path path) {
        String name = name(path);
        if (Files.isDirectory(path)) {
            throw new IntakeException(name, 0, "", "a file", "a folder");
        }
        if (!Files.exists(path)) {
            throw new IntakeException(name, 0, "", "a file", "nothing at " + path);
        }
        byte[] head = head(path);
        if (head.length == 0) {
            throw new IntakeException(name, 0, "", "a header and rows of numbers", "an empty file");
        }
        SourceFile file = marked(path, head);
        if (file.charset.equals(StandardCharsets.UTF_8)) {
            refuseBinary(name, head);
        }
        return file;
    }

    private static byte[] head(Path path) {
        try (InputStream in = Files.newInputStream(path)) {
            return in.readNBytes(HEAD);
        } catch (IOException e) {
            throw unreadable(path, e);
        }
    }

    private static SourceFile marked(Path path, byte[] head) {
        if (startsWith(head, 0xEF, 0xBB, 0xBF)) {
            return new SourceFile(path, StandardCharsets.UTF_8, 3);
        } else if (startsWith(head, 0xFF, 0xFE)) {
            return new SourceFile(path, StandardCharsets.UTF_16LE, 2);
        } else if (startsWith(head, 0xFE, 0xFF)) {
            return new SourceFile(path, StandardCharsets.UTF_16BE, 2);
        }
        return new SourceFile(path, StandardCharsets.UTF_8, 0);
    }

    private static boolean startsWith(byte[] head, int... mark) {
        return head.length >= mark.length && IntStream.range(0, mark.length).allMatch(i -> (head[i] & 0xFF) == mark[i]);
    }

    private static void refuseBinary(String name, byte[] head) {
        for (int i = 0; i < head.length; i++) {
            boolean text = head[i] < 0 || head[i] >= ' ' || "\t\n\r\f".indexOf(head[i]) >= 0;
            if (!text) {
                throw new IntakeException(
                        name,
                        0,
                        "",
                        "delimited text",
                        "a binary file (byte " + HexFormat.of().toHexDigits(head[i]) + " at place " + (i + 1) + ")");
            }
        }
    }

    private static IntakeException unreadable(Path path, IOException cause) {
        return new IntakeException(name(path), 0, "", "a readable file", cause.toString()).because(cause);
    }

    private static String name(Path path) {
        return path.getFileName() == null ? path.toString() : path.getFileName().toString();
    }

    /** The same file, read as ISO 8859-1, in which every byte is a letter. */
    SourceFile asLatin() {
        return new SourceFile(path, StandardCharsets.ISO_8859_1, 0);
    }

    Path path() {
        return path;
    }

    String name() {
        return name(path);
    }

    /** The encoding in words. */
    String encoding() {
        return charset.name() + (mark > 0 ? " with byte order mark" : "");
    }

    boolean isUtf8() {
        return charset.equals(StandardCharsets.UTF_8);
    }

    /** Size in bytes. */
    long size() {
        try {
            return Files.size(path);
        } catch (IOException e) {
            throw unreadable(path, e);
        }
    }

    /** Opens the text after the byte order mark; malformed text ends reading with a CharacterCodingException. */
    Text open() {
        MessageDigest digest = sha256();
        try {
            InputStream bytes =
                    new BufferedInputStream(new DigestInputStream(Files.newInputStream(path), digest), HEAD);
            bytes.skipNBytes(mark);
            Reader reader = new InputStreamReader(
                    bytes,
                    charset.newDecoder()
                            .onMalformedInput(CodingErrorAction.REPORT)
                            .onUnmappableCharacter(CodingErrorAction.REPORT));
            return new Text(bytes, reader, digest);
        } catch (IOException e) {
            throw unreadable(path, e);
        }
    }

    private static MessageDigest sha256() {
        try {
            return MessageDigest.getInstance("SHA-256");
        } catch (NoSuchAlgorithmException e) {
            throw new IllegalStateException("every Java platform has SHA-256", e);
        }
    }

    /** The text of one pass through the file. */
    record Text(InputStream bytes, Reader reader, MessageDigest digest) implements AutoCloseable {
        /** SHA-256 of the whole file in hexadecimal; reads what is left of it. */
        String sha256() {
            try {
                bytes.transferTo(OutputStream.nullOutputStream());
            } catch (IOException e) {
                throw new UncheckedIOException(e);
            }
            return HexFormat.of().formatHex(digest.digest());
        }

        @Override
        public void close() {
            try {
                reader.close();
            } catch (IOException e) {
                throw new UncheckedIOException(e);
            }
        }
    }

    /**
     * The first whole lines of the file, of no more than {@code characters} in all.
     *
     * @throws IntakeException if the first line is longer than that
     */
    String beginning(int characters) {
        char[] buffer = new char[characters];
        int filled = 0;
        try (Text text = open()) {
            for (int read = 0; read >= 0 && filled < characters; filled += Math.max(read, 0)) {
                read = text.reader().read(buffer, filled, characters - filled);
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        String start = new String(buffer, 0, filled);
        int lastEnd = Math.max(start.lastIndexOf('\n'), start.lastIndexOf('\r'));
        if (filled == characters && lastEnd < 0) {
            throw new IntakeException(name(), 1, "", "a header", "a line of more than " + characters + " characters");
        }
        return filled < characters ? start : start.substring(0, lastEnd + 1);
    }
}
