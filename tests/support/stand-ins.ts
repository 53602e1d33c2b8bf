import type { StoredMail } from "@/tests/fakes/mail/store";

/** The local inbox and payment provider of a running product, for journeys and drills that only know their addresses. */
async function answer(response: Response, what: string): Promise<unknown> {
  const text = await response.text();
  if (!response.ok) throw new Error(`${what}: ${response.status} ${text.slice(0, 500)}`);
  return text === "" ? null : (JSON.parse(text) as unknown);
}

export interface Inbox {
  /** The earliest message that fits and arrived after `after` (a message's `number`). Waits for it. */
  wait(wanted: { to?: string; subject?: string; after?: number; timeoutMs?: number }): Promise<StoredMail>;
  /** Newest first. */
  list(wanted?: { to?: string; subject?: string }): Promise<StoredMail[]>;
  attachment(mail: StoredMail, index: number): Promise<Buffer>;
  faults(list: readonly object[]): Promise<void>;
}

export function inboxAt(url: string): Inbox {
  const query = (wanted: { to?: string; subject?: string; after?: number }, more: Record<string, string> = {}) => {
    const given = Object.entries({ ...wanted, ...more }).filter(([name, value]) => name !== "timeoutMs" && value !== undefined);
    return new URLSearchParams(given.map(([name, value]) => [name, String(value)])).toString();
  };
  return {
    wait: async (wanted) => (await answer(await fetch(`${url}/api/messages/wait?${query(wanted, { timeout: String(wanted.timeoutMs ?? 20_000) })}`), `waiting for mail ${JSON.stringify(wanted)}`)) as StoredMail,
    list: async (wanted = {}) => (await answer(await fetch(`${url}/api/messages?${query(wanted)}`), "listing mail")) as StoredMail[],
    attachment: async (mail, index) => {
      const response = await fetch(`${url}/messages/${mail.id}/attachments/${index}`);
      if (!response.ok) throw new Error(`attachment ${index} of ${mail.subject}: ${response.status}`);
      return Buffer.from(await response.arrayBuffer());
    },
    faults: async (list) => {
      await answer(await fetch(`${url}/api/faults`, { method: "POST", body: JSON.stringify(list) }), "setting mail faults");
    },
  };
}

/** The first address in a message's text whose path begins with `path`. */
export function linkIn(mail: StoredMail, path: string): string {
  const found = (mail.text.match(/https?:\/\/[^\s<>"]+/g) ?? []).find((link) => new URL(link).pathname.startsWith(path));
  if (found === undefined) throw new Error(`no link to ${path} in "${mail.subject}":\n${mail.text}`);
  return found.replace(/[.,;:!?)]+$/, "");
}

/** Pull one of the payment provider's levers; they are listed in tests/fakes/stripe/README.md. */
export async function paymentLever(url: string, what: string, input: object = {}): Promise<unknown> {
  return await answer(await fetch(`${url}/_control/${what}`, { method: "POST", body: JSON.stringify(input) }), what);
}
