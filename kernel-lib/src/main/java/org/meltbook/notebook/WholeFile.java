package org.meltbook.notebook;

import java.io.IOException;
import java.nio.ByteBuffer;
import java.nio.channels.FileChannel;
import java.nio.charset.StandardCharsets;
import java.nio.file.AtomicMoveNotSupportedException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.nio.file.StandardCopyOption;
import java.nio.file.StandardOpenOption;

/** Files that appear whole or not at all: written aside in the same folder, then moved into place. */
final class WholeFile {
    private WholeFile() {}

    /**
     * Writes the text as UTF-8; a file that was there is replaced in one step.
     *
     * @throws NotebookException if that cannot be done; then what was there is still there
     */
    static void write(Path file, String text) {
        Path target = file.toAbsolutePath();
        Path aside = target.resolveSibling(
                "." + target.getFileName() + "." + ProcessHandle.current().pid() + ".part");
        try {
            Files.createDirectories(target.getParent());
            try (FileChannel channel = FileChannel.open(
                    aside, StandardOpenOption.CREATE, StandardOpenOption.TRUNCATE_EXISTING, StandardOpenOption.WRITE)) {
                ByteBuffer bytes = ByteBuffer.wrap(text.getBytes(StandardCharsets.UTF_8));
                while (bytes.hasRemaining()) {
                    channel.write(bytes);
                }
                channel.force(true);
            }
            move(aside, target);
        } catch (IOException e) {
            discard(aside, e);
            throw new NotebookException(file + ": cannot be written: " + reason(e), e);
        }
    }

    private static void move(Path aside, Path target) throws IOException {
        try {
            Files.move(aside, target, StandardCopyOption.ATOMIC_MOVE, StandardCopyOption.REPLACE_EXISTING);
        } catch (AtomicMoveNotSupportedException e) {
            throw new IOException("the file system cannot move a file in one step", e);
        }
    }

    private static void discard(Path aside, IOException cause) {
        try {
            Files.deleteIfExists(aside);
        } catch (IOException e) {
            cause.addSuppressed(e);
        }
    }

    private static String reason(IOException e) {
        return e.getClass().getSimpleName().replaceFirst("Exception$", "") + " " + e.getMessage();
    }
}
