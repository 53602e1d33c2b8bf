import type { AddressInfo } from "node:net";
import { SMTPServer, type SMTPServerDataStream } from "smtp-server";
import type { MailStore } from "./store";

/** What goes wrong with the next messages. */
export type MailFault =
  /** A reply of the 4yz or 5yz kind to the recipient (`rcpt`) or to the whole message (`data`). */
  | { readonly kind: "refuse"; readonly code: number; readonly stage: "rcpt" | "data"; times: number }
  /** The message is kept, but the connection breaks before the server has said so. */
  | { readonly kind: "cut"; times: number }
  /** The server stays silent for `ms` before it answers. */
  | { readonly kind: "slow"; readonly ms: number; times: number };

export class Faults {
  private list: MailFault[] = [];

  set(faults: readonly MailFault[]): void {
    this.list = faults.map((f) => ({ ...f }));
  }

  get pending(): readonly MailFault[] {
    return this.list;
  }

  /** The next fault of a kind, used up once. */
  take<K extends MailFault["kind"]>(kind: K, fits: (fault: Extract<MailFault, { kind: K }>) => boolean = () => true): Extract<MailFault, { kind: K }> | null {
    const fault = this.list.find((f): f is Extract<MailFault, { kind: K }> => f.kind === kind && fits(f as Extract<MailFault, { kind: K }>));
    if (fault === undefined) return null;
    fault.times -= 1;
    if (fault.times <= 0) this.list = this.list.filter((f) => f !== fault);
    return fault;
  }
}

const BYTES_MAX = 30 * 1024 * 1024;

async function read(stream: SMTPServerDataStream): Promise<Buffer> {
  const chunks: Buffer[] = [];
  for await (const chunk of stream as AsyncIterable<Buffer>) chunks.push(chunk);
  return Buffer.concat(chunks);
}

const refusal = (code: number): Error => Object.assign(new Error(code < 500 ? "Try again later (a fault set on purpose)" : "Refused (a fault set on purpose)"), { responseCode: code });

const sleep = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** An SMTP server that keeps everything and passes nothing on. */
export async function startSink(store: MailStore, faults: Faults, port: number): Promise<{ port: number; close: () => Promise<void> }> {
  const sockets = new Map<string, { destroy(): void }>();

  const server = new SMTPServer({
    banner: "local inbox, nothing is delivered",
    authOptional: true,
    disabledCommands: ["AUTH", "STARTTLS"],
    disableReverseLookup: true,
    size: BYTES_MAX,
    onRcptTo(_address, _session, done) {
      const fault = faults.take("refuse", (f) => f.stage === "rcpt");
      done(fault === null ? null : refusal(fault.code));
    },
    onData(stream, session, done) {
      void (async () => {
        const raw = await read(stream);
        if (stream.sizeExceeded) return done(refusal(552));
        const slow = faults.take("slow");
        if (slow !== null) await sleep(slow.ms);
        const fault = faults.take("refuse", (f) => f.stage === "data");
        if (fault !== null) return done(refusal(fault.code));
        const { mailFrom, rcptTo } = session.envelope;
        await store.add(raw, { from: mailFrom === false ? "" : mailFrom.address, to: rcptTo.map((r) => r.address) });
        if (faults.take("cut") === null) return done();
        sockets.get(session.id)?.destroy();
      })().catch((error: unknown) => done(error instanceof Error ? error : new Error(String(error))));
    },
  });
  server.on("error", (error) => console.error(error));
  server.server.on("connection", (socket) => {
    const key = `${socket.remoteAddress ?? ""}:${socket.remotePort ?? 0}`;
    byPeer.set(key, socket);
    socket.once("close", () => byPeer.delete(key));
  });
  const byPeer = new Map<string, { destroy(): void }>();
  server.onConnect = (session, done) => {
    const socket = byPeer.get(`${session.remoteAddress}:${session.remotePort}`);
    if (socket !== undefined) sockets.set(session.id, socket);
    done();
  };
  server.onClose = (session) => sockets.delete(session.id);

  await new Promise<void>((resolve, reject) => {
    server.server.once("error", reject);
    server.listen(port, "127.0.0.1", resolve);
  });
  return {
    port: (server.server.address() as AddressInfo).port,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        for (const socket of byPeer.values()) socket.destroy();
      }),
  };
}
