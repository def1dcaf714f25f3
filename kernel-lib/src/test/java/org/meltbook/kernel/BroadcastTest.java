package org.meltbook.kernel;

import static org.junit.jupiter.api.Assertions.assertTimeoutPreemptively;

import com.google.gson.JsonObject;
import java.time.Duration;
import java.util.concurrent.atomic.AtomicBoolean;
import org.dflib.jjava.jupyter.messages.HMACGenerator;
import org.junit.jupiter.api.Test;
import org.zeromq.SocketType;
import org.zeromq.ZMQ;

class BroadcastTest {
    /** A flush that waits for the others too never returns; this one usually takes a second or two. */
    @Test
    void a_flush_does_not_wait_for_what_others_go_on_printing() throws InterruptedException {
        ZMQ.Context context = ZMQ.context(1);
        ZMQ.Socket socket = context.socket(SocketType.PUB);
        socket.setLinger(0);
        socket.bind("inproc://broadcast");
        Broadcast broadcast = new Broadcast(new Wire(HMACGenerator.NO_AUTH_INSTANCE), socket);
        broadcast.start();
        AtomicBoolean enough = new AtomicBoolean();
        JsonObject about = new JsonObject();
        Thread noise = new Thread(() -> {
            while (!enough.get()) {
                broadcast.print(about, "stdout", "noise\n");
            }
        });
        noise.start();
        try {
            Thread.sleep(200);
            assertTimeoutPreemptively(Duration.ofSeconds(30), broadcast::flush);
        } finally {
            enough.set(true);
            noise.join();
            broadcast.close();
            context.term();
        }
    }
}
