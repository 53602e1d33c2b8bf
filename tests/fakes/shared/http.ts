import { createServer, type IncomingMessage, type Server, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";

/** The little that the stand-ins need of an HTTP server. */
export interface Call {
  readonly method: string;
  readonly url: URL;
  readonly headers: IncomingMessage["headers"];
  readonly body: Buffer;
  /** The socket underneath, for faults that break the connection. */
  readonly request: IncomingMessage;
}

export interface Answer {
  readonly status: number;
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string | Buffer;
}

/** Null: the handler has taken the socket itself. */
export type Handler = (call: Call) => Answer | null | Promise<Answer | null>;

const BODY_BYTES_MAX = 2 * 1024 * 1024;

async function bodyOf(request: IncomingMessage): Promise<Buffer> {
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of request as AsyncIterable<Buffer>) {
    size += chunk.length;
    if (size > BODY_BYTES_MAX) throw new Error("body too large");
    chunks.push(chunk);
  }
  return Buffer.concat(chunks);
}

async function serve(handler: Handler, request: IncomingMessage, response: ServerResponse): Promise<void> {
  try {
    const call: Call = {
      method: request.method ?? "GET",
      url: new URL(request.url ?? "/", `http://${request.headers.host ?? "127.0.0.1"}`),
      headers: request.headers,
      body: await bodyOf(request),
      request,
    };
    const answer = await handler(call);
    if (answer === null) return;
    response.writeHead(answer.status, { "cache-control": "no-store", ...answer.headers });
    response.end(answer.body);
  } catch (error) {
    console.error(error);
    if (!response.headersSent) response.writeHead(500, { "content-type": "text/plain" });
    response.end("The stand-in itself failed; see its log.");
  }
}

export async function listen(handler: Handler, port: number): Promise<{ server: Server; port: number; close: () => Promise<void> }> {
  const server = createServer((request, response) => void serve(handler, request, response));
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(port, "127.0.0.1", resolve);
  });
  return {
    server,
    port: (server.address() as AddressInfo).port,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

export const json = (value: unknown, status = 200, headers: Record<string, string> = {}): Answer => ({
  status,
  headers: { "content-type": "application/json; charset=utf-8", ...headers },
  body: JSON.stringify(value),
});

export const page = (html: string, status = 200): Answer => ({
  status,
  headers: {
    "content-type": "text/html; charset=utf-8",
    "content-security-policy": "default-src 'none'; style-src 'unsafe-inline'; frame-src 'self'; img-src 'self' data:; base-uri 'none'",
  },
  body: html,
});

export const redirect = (location: string): Answer => ({ status: 303, headers: { location } });
