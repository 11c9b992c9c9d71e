import { createServer, connect, type AddressInfo, type Socket } from 'node:net';

export interface SlowLine {
  /** Address that leads to the server behind the line, with a slash at its end. */
  readonly url: string;
  /** Bytes that came down the line so far, headers included. */
  receivedBytes(): number;
  stop(): Promise<void>;
}

export interface LineSpeed {
  /** Bits per second downwards, shared by all connections; the way up is only delayed. */
  readonly bitsPerS: number;
  readonly roundTripMs: number;
}

/**
 * A line between browser and server that is as slow for the service worker as for the page, which the browser's own
 * emulation is not. Opening a connection costs a round trip too. Not in it: name look-up, encryption, slow start.
 */
export async function openSlowLine(targetUrl: string, speed: LineSpeed): Promise<SlowLine> {
  const port = Number(new URL(targetUrl).port);
  const sockets = new Set<Socket>();
  let freeAtMs = 0;
  let received = 0;
  const server = createServer((near) => {
    const far = connect(port, '127.0.0.1');
    for (const socket of [near, far]) {
      sockets.add(socket);
      socket.setNoDelay(true);
      socket.on('error', () => [near, far].forEach((end) => end.destroy()));
    }
    const up = delayed(far);
    const down = delayed(near);
    const openedMs = performance.now();
    near.on('data', (bytes) => {
      up.send(bytes, Math.max(performance.now(), openedMs + speed.roundTripMs) + speed.roundTripMs / 2);
    });
    far.on('data', (bytes) => {
      freeAtMs = Math.max(performance.now(), freeAtMs) + (bytes.length * 8 * 1000) / speed.bitsPerS;
      down.send(bytes, freeAtMs + speed.roundTripMs / 2, () => (received += bytes.length));
    });
    near.on('close', () => far.destroy());
    far.on('end', () => down.end());
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/`,
    receivedBytes: () => received,
    stop() {
      for (const socket of sockets) socket.destroy();
      return new Promise((resolve) => server.close(() => resolve()));
    },
  };
}

/** Writes in order, each piece not before its time. */
function delayed(socket: Socket) {
  let lastMs = 0;
  return {
    send(bytes: Buffer, atMs: number, onSent?: () => void) {
      lastMs = Math.max(lastMs, atMs);
      setTimeout(() => {
        if (!socket.destroyed) socket.write(bytes);
        onSent?.();
      }, lastMs - performance.now());
    },
    end() {
      setTimeout(() => socket.end(), lastMs - performance.now() + 1);
    },
  };
}
