import { json, listen, page, redirect, type Answer, type Call } from "../shared/http";
import { htmlPart, listPage, mailPage } from "./pages";
import { Faults, startSink, type MailFault } from "./sink";
import { MailStore } from "./store";

const missing = page("<!doctype html><title>Not here</title><p>There is no such message.", 404);

function download(file: { name: string; mime: string; bytes: Buffer }): Answer {
  return {
    status: 200,
    headers: {
      "content-type": file.mime,
      "content-disposition": `attachment; filename*=UTF-8''${encodeURIComponent(file.name)}`,
      "x-content-type-options": "nosniff",
    },
    body: file.bytes,
  };
}

async function ofMessage(store: MailStore, id: string, part: string | undefined, index: string | undefined): Promise<Answer> {
  const mail = store.byId(id);
  if (mail === undefined) return missing;
  if (part === undefined) return page(mailPage(mail));
  if (part === "html" && mail.html !== null) {
    const shown = page(htmlPart(mail.html));
    return { ...shown, headers: { ...shown.headers, "content-security-policy": "default-src 'none'; style-src 'unsafe-inline'; img-src data:" } };
  }
  if (part === "raw") return { status: 200, headers: { "content-type": "text/plain; charset=utf-8" }, body: await store.raw(mail) };
  if (part === "attachments") {
    const file = await store.attachment(mail, Number(index));
    if (file !== null) return download(file);
  }
  return missing;
}

async function api(store: MailStore, faults: Faults, call: Call, rest: readonly string[]): Promise<Answer> {
  const query = call.url.searchParams;
  const filter = { to: query.get("to"), subject: query.get("subject"), after: Number(query.get("after") ?? 0) };
  if (rest[0] === "faults" && call.method === "POST") {
    faults.set(JSON.parse(call.body.toString("utf8")) as MailFault[]);
    return json(faults.pending);
  }
  if (rest[0] === "faults") return json(faults.pending);
  if (rest[0] !== "messages") return json({ error: "no such address" }, 404);
  if (call.method === "DELETE") {
    await store.clear();
    return json({ cleared: true });
  }
  if (rest[1] === "wait") {
    const until = Date.now() + Math.min(Number(query.get("timeout") ?? 10_000), 60_000);
    for (;;) {
      // The earliest that fits: a test that waits twice must not skip one.
      const found = store.find(filter).at(-1);
      if (found !== undefined) return json(found);
      const left = until - Date.now();
      if (left <= 0) return json({ error: "no such message arrived in time", filter }, 408);
      await store.arrival(left);
    }
  }
  if (rest[1] !== undefined) {
    const mail = store.byId(rest[1]);
    return mail === undefined ? json({ error: "no such message" }, 404) : json(mail);
  }
  return json(store.find(filter));
}

export interface MailStandIn {
  readonly smtpPort: number;
  readonly inboxPort: number;
  readonly store: MailStore;
  readonly faults: Faults;
  close(): Promise<void>;
}

/** The SMTP sink and its inbox page. Port 0 takes any free port. */
export async function startMail(options: { smtpPort: number; inboxPort: number; folder: string }): Promise<MailStandIn> {
  const store = await MailStore.open(options.folder);
  const faults = new Faults();
  const sink = await startSink(store, faults, options.smtpPort);
  const inbox = await listen(async (call) => {
    const [first, ...rest] = call.url.pathname.split("/").filter(Boolean);
    if (first === undefined) return page(listPage(store.find()));
    if (first === "api") return await api(store, faults, call, rest);
    if (first === "messages" && rest[0] !== undefined) return await ofMessage(store, rest[0], rest[1], rest[2]);
    if (first === "clear" && call.method === "POST") {
      await store.clear();
      return redirect("/");
    }
    return missing;
  }, options.inboxPort);
  return {
    smtpPort: sink.port,
    inboxPort: inbox.port,
    store,
    faults,
    close: async () => {
      await Promise.all([sink.close(), inbox.close()]);
    },
  };
}
