import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { openFiles } from "./open";
import { FileTaken, newFileKey, type FilePort } from "./port";

/** The four calls of the S3 protocol that the adapter makes, over an in-memory bucket. */
let server: Server;
let files: FilePort;
let stored: Map<string, { bytes: Buffer; mime: string }>;
let broken: boolean;

beforeEach(async () => {
  stored = new Map();
  broken = false;
  server = createServer((request, response) => {
    const chunks: Buffer[] = [];
    request.on("data", (chunk: Buffer) => chunks.push(chunk));
    request.on("end", () => {
      const name = (request.url ?? "").split("?")[0] ?? "";
      const signed = /^AWS4-HMAC-SHA256 Credential=AKIDTEST\//.test(request.headers.authorization ?? "");
      const kept = stored.get(name);
      if (broken || !signed) response.writeHead(broken ? 500 : 403).end();
      else if (request.method === "PUT") {
        if (kept !== undefined && request.headers["if-none-match"] === "*") {
          response.writeHead(412).end("<Error><Code>PreconditionFailed</Code></Error>");
          return;
        }
        stored.set(name, { bytes: Buffer.concat(chunks), mime: request.headers["content-type"] ?? "" });
        response.writeHead(200, { etag: '"x"' }).end();
      } else if (request.method === "DELETE") {
        stored.delete(name);
        response.writeHead(204).end();
      } else if (kept === undefined) response.writeHead(404).end(request.method === "HEAD" ? undefined : "<Error><Code>NoSuchKey</Code></Error>");
      else response.writeHead(200, { "content-type": kept.mime, "content-length": kept.bytes.length }).end(request.method === "HEAD" ? undefined : kept.bytes);
    });
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  files = openFiles({
    kind: "s3", bucket: "shop-files", endpoint: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, region: "us-east-1", accessKeyId: "AKIDTEST", secretAccessKey: "secret",
  });
});
afterEach(() => {
  server.closeAllConnections();
  server.close();
});

const key = () => newFileKey("shop-1", "photo", "jpg");

describe("files in a bucket", () => {
  it("are stored as the very bytes, under bucket and key, and come back", async () => {
    const k = key();
    const bytes = Buffer.from("head\r\n0\r\n");
    expect(await files.put(k, bytes, "image/jpeg")).toMatchObject({ key: k, size: bytes.length });
    expect(stored.get(`/shop-files/${k}`)).toEqual({ bytes, mime: "image/jpeg" });
    expect(await files.get(k)).toEqual(bytes);
    expect(await files.exists(k)).toBe(true);
    await files.delete(k);
    expect(await files.get(k)).toBeNull();
    expect(await files.exists(k)).toBe(false);
  });
  it("are never overwritten", async () => {
    const k = key();
    await files.put(k, Buffer.from("first"), "text/plain");
    await expect(files.put(k, Buffer.from("second"), "text/plain")).rejects.toBeInstanceOf(FileTaken);
    expect((await files.get(k))?.toString()).toBe("first");
  });
  it("are not called missing when the store fails", async () => {
    broken = true;
    await expect(files.get(key())).rejects.toThrow();
    await expect(files.exists(key())).rejects.toThrow();
    await expect(files.put(key(), Buffer.from("x"), "text/plain")).rejects.toThrow();
  });
  it("can't have a key that leaves the bucket", async () => {
    await expect(files.get("../other-bucket/x")).rejects.toThrow(RangeError);
  });
});
