import { once } from 'node:events';
import { connect, createServer, type Server, type Socket } from 'node:net';

/** A cable to a server that can be pulled out and plugged in again. */
export class Cable {
  readonly #sockets = new Set<Socket>();
  #server: Server | null = null;
  #port = 0;

  constructor(private readonly target: URL) {}

  /** The target's address through the cable. */
  address(): string {
    return Object.assign(new URL(this.target), { host: `127.0.0.1:${this.#port}` }).href;
  }

  async plugIn(): Promise<void> {
    const server = createServer((near) => {
      const far = connect(Number(this.target.port), this.target.hostname);
      for (const [from, to] of [
        [near, far],
        [far, near],
      ] as const) {
        this.#sockets.add(from);
        from.on('error', () => to.destroy());
        from.on('close', () => {
          this.#sockets.delete(from);
          to.destroy();
        });
        from.pipe(to);
      }
    });
    server.listen(this.#port, '127.0.0.1');
    await once(server, 'listening');
    const address = server.address();
    if (typeof address === 'object' && address !== null) this.#port = address.port;
    this.#server = server;
  }

  /** Cuts what is connected; new connections are refused. */
  async pullOut(): Promise<void> {
    const server = this.#server;
    if (server === null) return;
    this.#server = null;
    server.close();
    for (const socket of this.#sockets) socket.destroy();
    await once(server, 'close');
  }
}
