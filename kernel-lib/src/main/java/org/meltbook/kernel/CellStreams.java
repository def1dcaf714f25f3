package org.meltbook.kernel;

import java.io.IOException;
import java.io.InputStream;
import java.io.OutputStream;
import java.io.PrintStream;
import java.io.UncheckedIOException;
import java.nio.ByteBuffer;
import java.nio.CharBuffer;
import java.nio.charset.CharsetDecoder;
import java.nio.charset.CodingErrorAction;
import java.nio.charset.StandardCharsets;
import java.util.Optional;
import java.util.function.BiConsumer;

/**
 * Standard output, error and input of the process while a session is open: what is printed goes to the outlet of the
 * last cell, also from threads that outlive it; what is read is asked of the person at the keyboard.
 */
final class CellStreams implements AutoCloseable {
    private final PrintStream formerOut = System.out;
    private final PrintStream formerErr = System.err;
    private final InputStream formerIn = System.in;
    private final PrintStream out = new PrintStream(new Printed(formerOut, Outlet::out), true, StandardCharsets.UTF_8);
    private final PrintStream err = new PrintStream(new Printed(formerErr, Outlet::err), true, StandardCharsets.UTF_8);
    private final InputStream in = new Asked();
    private volatile Optional<Outlet> outlet = Optional.empty();

    CellStreams() {
        System.setOut(out);
        System.setErr(err);
        System.setIn(in);
    }

    /** Sends what is printed from now on to {@code next}. */
    void to(Outlet next) {
        outlet = Optional.of(next);
    }

    void flush() {
        out.flush();
        err.flush();
    }

    /** Puts the former streams back, unless someone else has replaced ours. */
    @Override
    public void close() {
        flush();
        if (System.out == out) {
            System.setOut(formerOut);
        }
        if (System.err == err) {
            System.setErr(formerErr);
        }
        if (System.in == in) {
            System.setIn(formerIn);
        }
    }

    /** Bytes of UTF-8 to text in pieces; a letter cut in two waits for its rest. */
    private final class Printed extends OutputStream {
        private final PrintStream former;
        private final BiConsumer<Outlet, String> channel;
        private final CharsetDecoder decoder = StandardCharsets.UTF_8
                .newDecoder()
                .onMalformedInput(CodingErrorAction.REPLACE)
                .onUnmappableCharacter(CodingErrorAction.REPLACE);
        private ByteBuffer waiting = ByteBuffer.allocate(0);

        Printed(PrintStream former, BiConsumer<Outlet, String> channel) {
            this.former = former;
            this.channel = channel;
        }

        @Override
        public void write(int single) {
            write(new byte[] {(byte) single}, 0, 1);
        }

        @Override
        public synchronized void write(byte[] bytes, int offset, int length) {
            Optional<Outlet> target = outlet;
            if (target.isEmpty()) {
                former.write(bytes, offset, length);
                return;
            }
            ByteBuffer all = ByteBuffer.allocate(waiting.remaining() + length)
                    .put(waiting)
                    .put(bytes, offset, length)
                    .flip();
            CharBuffer text = CharBuffer.allocate(all.remaining() + 1);
            decoder.decode(all, text, false);
            waiting = all;
            if (text.position() > 0) {
                channel.accept(target.get(), text.flip().toString());
            }
        }

        @Override
        public void flush() {
            if (outlet.isEmpty()) {
                former.flush();
            }
        }
    }

    /** Lines as the person types them, one question a line. */
    private final class Asked extends InputStream {
        private ByteBuffer line = ByteBuffer.allocate(0);

        @Override
        public synchronized int read() throws IOException {
            fill();
            return line.get() & 0xff;
        }

        @Override
        public synchronized int read(byte[] into, int offset, int length) throws IOException {
            if (length == 0) {
                return 0;
            }
            fill();
            int count = Math.min(length, line.remaining());
            line.get(into, offset, count);
            return count;
        }

        @Override
        public synchronized int available() {
            return line.remaining();
        }

        private void fill() throws IOException {
            if (line.hasRemaining()) {
                return;
            }
            Outlet asked = outlet.orElseThrow(() -> new IOException("no cell runs that could ask for input"));
            try {
                line = ByteBuffer.wrap((asked.ask("", false) + "\n").getBytes(StandardCharsets.UTF_8));
            } catch (UncheckedIOException e) {
                // Unchecked: a Scanner takes an IOException for the end of the input and hides why there is none.
                throw new UncheckedIOException(e.getCause().getMessage(), e.getCause());
            }
        }
    }
}
