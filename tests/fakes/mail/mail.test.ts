import { createHash, randomBytes } from "node:crypto";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { MailFailure, type MailMessage, type MailPort } from "@/modules/outbound/mail/port";
import { smtpMail } from "@/modules/outbound/mail/smtp";
import { startMail, type MailStandIn } from "./server";
import type { StoredMail } from "./store";

let folder: string;
let box: MailStandIn;
let port: MailPort;

beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), "mail-"));
  box = await startMail({ smtpPort: 0, inboxPort: 0, folder });
  port = smtpMail({ url: `smtp://127.0.0.1:${box.smtpPort}`, from: "Heads <shop@example.com>", timeoutMs: 10_000 });
});
afterEach(async () => {
  port.close();
  await box.close();
  await rm(folder, { recursive: true });
});

const message = (more: Partial<MailMessage> = {}): MailMessage => ({
  messageId: "<invoice.1042.1@example.com>", to: "dana@example.org", subject: "Invoice 1042: größer & <better>", text: "Pay here: https://example.com/l/abc?x=1.", ...more,
});
const url = (rest: string) => `http://127.0.0.1:${box.inboxPort}${rest}`;
const failure = async (sending: Promise<unknown>): Promise<MailFailure> => {
  const error: unknown = await sending.then(() => null, (e: unknown) => e);
  expect(error).toBeInstanceOf(MailFailure);
  return error as MailFailure;
};

describe("mail over SMTP", () => {
  it("arrives whole, with our Message-ID, both parts and the same attachment", async () => {
    const pdf = randomBytes(200_000);
    const receipt = await port.send(message({
      toName: 'Dana "D" O\nrtiz', fromName: "Iron Heads", replyTo: "desk@example.com", html: "<p>Pay <a href='https://example.com/l/abc'>here</a></p>",
      attachments: [{ name: "invoice 1042.pdf", mime: "application/pdf", bytes: pdf }],
    }));
    expect(receipt).toEqual({ messageId: "<invoice.1042.1@example.com>", accepted: ["dana@example.org"], rejected: [] });
    const [mail] = (await (await fetch(url("/api/messages?to=DANA@example.org"))).json()) as StoredMail[];
    expect(mail).toMatchObject({
      messageId: "<invoice.1042.1@example.com>", from: '"Iron Heads" <shop@example.com>', to: ["dana@example.org"], subject: "Invoice 1042: größer & <better>",
      attachments: [{ name: "invoice 1042.pdf", mime: "application/pdf", size: 200_000 }],
    });
    const got = Buffer.from(await (await fetch(url(`/messages/${mail?.id}/attachments/0`))).arrayBuffer());
    expect(createHash("sha256").update(got).digest("hex")).toBe(createHash("sha256").update(pdf).digest("hex"));
    const raw = (await (await fetch(url(`/messages/${mail?.id}/raw`))).text()).slice(0, 1200);
    expect(raw).toMatch(/^Reply-To: desk@example\.com$/m);
    expect(raw).toMatch(/^To: "?Dana D O rtiz"? <dana@example\.org>$/m);
  });

  it.each([[451, true], [550, false]])("takes a %i to the recipient as final or not", async (code, retry) => {
    box.faults.set([{ kind: "refuse", code, stage: "rcpt", times: 1 }]);
    expect(await failure(port.send(message()))).toMatchObject({ retry, reply: code });
    await expect(port.send(message())).resolves.toMatchObject({ rejected: [] });
  });
  it.each([[452, true], [554, false]])("takes a %i to the whole message as final or not", async (code, retry) => {
    box.faults.set([{ kind: "refuse", code, stage: "data", times: 1 }]);
    expect(await failure(port.send(message()))).toMatchObject({ retry, reply: code });
    expect(box.store.find()).toEqual([]);
  });
  it("may be tried again when the line breaks after the message was kept: the second copy has the same Message-ID", async () => {
    box.faults.set([{ kind: "cut", times: 1 }]);
    expect(await failure(port.send(message()))).toMatchObject({ retry: true, reply: null });
    await port.send(message());
    expect(box.store.find().map((m) => m.messageId)).toEqual(["<invoice.1042.1@example.com>", "<invoice.1042.1@example.com>"]);
  });
  it("gives up on a silent server, to try again later", async () => {
    const hasty = smtpMail({ url: `smtp://127.0.0.1:${box.smtpPort}`, from: "shop@example.com", timeoutMs: 150 });
    box.faults.set([{ kind: "slow", ms: 1500, times: 1 }]);
    expect(await failure(hasty.send(message()))).toMatchObject({ retry: true });
    hasty.close();
  });
  it("may be tried again when no server is there", async () => {
    const nobody = smtpMail({ url: "smtp://127.0.0.1:9", from: "shop@example.com", timeoutMs: 500 });
    expect(await failure(nobody.send(message()))).toMatchObject({ retry: true, reply: null });
    nobody.close();
  });
  it.each<[string, Partial<MailMessage>]>([
    ["two recipients", { to: "a@example.org, b@example.org" }],
    ["a smuggled header in the recipient", { to: "a@example.org\r\nBcc: b@example.org" }],
    ["a smuggled header in the subject", { subject: "x\r\nBcc: b@example.org" }],
    ["a bad reply address", { replyTo: "desk" }],
    ["a Message-ID with spaces", { messageId: "<a b@c>" }],
    ["a path as file name", { attachments: [{ name: "../x", mime: "text/plain", bytes: new Uint8Array(1) }] }],
    ["more than 10 MB", { attachments: [{ name: "x.pdf", mime: "application/pdf", bytes: new Uint8Array(10 * 1024 * 1024 + 1) }] }],
  ])("refuses %s for good, without sending", async (_what, more) => {
    expect(await failure(port.send(message(more)))).toMatchObject({ retry: false });
    expect(box.store.find()).toEqual([]);
  });
});

describe("the local inbox", () => {
  it("lists, opens and clears messages, with links that can be followed", async () => {
    await port.send(message({ html: "<p>Pay <a href='https://example.com/l/abc'>here</a><script>alert(1)</script></p>" }));
    const list = await (await fetch(url("/"))).text();
    expect(list).toContain("Nothing is delivered to anybody");
    const path_ = /href="(\/messages\/[^"]+)"/.exec(list)?.[1] ?? "";
    const open = await (await fetch(url(path_))).text();
    expect(open).toContain('<a href="https://example.com/l/abc?x=1">');
    const html = await fetch(url(`${path_}/html`));
    expect(await html.text()).toContain('<base target="_top">');
    expect(html.headers.get("content-security-policy")).toContain("default-src 'none'");
    await fetch(url("/api/messages"), { method: "DELETE" });
    expect(await (await fetch(url("/"))).text()).toContain("No mail has arrived yet");
    expect((await fetch(url(path_))).status).toBe(404);
  });
  it("lets a test wait for the next message to somebody", async () => {
    const waiting = fetch(url("/api/messages/wait?to=sam@example.org&timeout=15000"));
    await port.send(message());
    await port.send(message({ to: "sam@example.org", subject: "yours" }));
    const mail = (await (await waiting).json()) as StoredMail;
    expect(mail).toMatchObject({ subject: "yours", number: 2 });
    expect((await fetch(url(`/api/messages/wait?to=sam@example.org&after=${mail.number}&timeout=50`))).status).toBe(408);
  });
  it("keeps its messages over a restart", async () => {
    await port.send(message());
    await box.close();
    box = await startMail({ smtpPort: 0, inboxPort: 0, folder });
    expect(box.store.find()).toHaveLength(1);
    expect((await box.store.add(Buffer.from("Subject: two\r\n\r\nx"), { from: "a@b.co", to: ["c@d.co"] })).number).toBe(2);
  });
});
