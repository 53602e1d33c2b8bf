import { randomUUID } from "node:crypto";
import { mkdir, readdir, readFile, rename, rm, writeFile } from "node:fs/promises";
import path from "node:path";
import { simpleParser } from "mailparser";

export interface StoredMail {
  readonly id: string;
  /** Counts up from 1 in the order of arrival; never used twice. */
  readonly number: number;
  readonly receivedAt: string;
  readonly messageId: string;
  readonly from: string;
  /** Who it was delivered to, from the envelope. */
  readonly to: readonly string[];
  readonly subject: string;
  readonly text: string;
  readonly html: string | null;
  readonly attachments: readonly { readonly name: string; readonly mime: string; readonly size: number }[];
}

const whole = (raw: Buffer) => simpleParser(raw, { skipImageLinks: true, skipTextToHtml: true });

/** Messages in a folder, one pair of files each, so that they are there again after a restart. */
export class MailStore {
  private mails: StoredMail[] = [];
  private next = 1;
  private readonly waiting = new Set<() => void>();

  private constructor(private readonly folder: string) {}

  static async open(folder: string): Promise<MailStore> {
    await mkdir(folder, { recursive: true });
    const store = new MailStore(folder);
    for (const name of await readdir(folder)) {
      if (name.endsWith(".json")) store.mails.push(JSON.parse(await readFile(path.join(folder, name), "utf8")) as StoredMail);
    }
    store.mails.sort((a, b) => a.number - b.number);
    store.next = (store.mails.at(-1)?.number ?? 0) + 1;
    return store;
  }

  private file(mail: Pick<StoredMail, "number" | "id">, extension: string): string {
    return path.join(this.folder, `${String(mail.number).padStart(6, "0")}-${mail.id}.${extension}`);
  }

  async add(raw: Buffer, envelope: { from: string; to: readonly string[] }): Promise<StoredMail> {
    const parsed = await whole(raw);
    const mail: StoredMail = {
      id: randomUUID(),
      number: this.next,
      receivedAt: new Date().toISOString(),
      messageId: parsed.messageId ?? "",
      from: parsed.from?.text ?? envelope.from,
      to: envelope.to,
      subject: parsed.subject ?? "",
      text: parsed.text ?? "",
      html: typeof parsed.html === "string" ? parsed.html : null,
      attachments: parsed.attachments.map((a) => ({ name: a.filename ?? "unnamed", mime: a.contentType, size: a.size })),
    };
    this.next += 1;
    await writeFile(this.file(mail, "eml"), raw);
    // The description is what counts as the message: it appears last and whole.
    await writeFile(this.file(mail, "half"), JSON.stringify(mail));
    await rename(this.file(mail, "half"), this.file(mail, "json"));
    this.mails.push(mail);
    for (const wake of [...this.waiting]) wake();
    return mail;
  }

  /** Newest first. */
  find(filter: { to?: string | null; subject?: string | null; after?: number } = {}): StoredMail[] {
    const to = filter.to?.toLowerCase();
    const subject = filter.subject?.toLowerCase();
    return this.mails
      .filter((m) => (!to || m.to.some((t) => t.toLowerCase() === to)) && (!subject || m.subject.toLowerCase().includes(subject)) && m.number > (filter.after ?? 0))
      .reverse();
  }

  byId(id: string): StoredMail | undefined {
    return this.mails.find((m) => m.id === id);
  }

  async raw(mail: StoredMail): Promise<Buffer> {
    return await readFile(this.file(mail, "eml"));
  }

  async attachment(mail: StoredMail, index: number): Promise<{ name: string; mime: string; bytes: Buffer } | null> {
    const found = (await whole(await this.raw(mail))).attachments[index];
    return found === undefined ? null : { name: found.filename ?? "unnamed", mime: found.contentType, bytes: found.content };
  }

  async clear(): Promise<void> {
    const gone = this.mails;
    this.mails = [];
    await Promise.all(gone.flatMap((m) => [rm(this.file(m, "json"), { force: true }), rm(this.file(m, "eml"), { force: true })]));
  }

  /** Resolves at the next arrival or after `ms`. */
  async arrival(ms: number): Promise<void> {
    await new Promise<void>((resolve) => {
      const done = () => {
        clearTimeout(timer);
        this.waiting.delete(done);
        resolve();
      };
      const timer = setTimeout(done, ms);
      this.waiting.add(done);
    });
  }
}
