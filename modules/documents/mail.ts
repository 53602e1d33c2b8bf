import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq } from "drizzle-orm";
import { mailMessages, shopSettings } from "@/db/schema";
import { withShop } from "@/db/scope";
import { inShop, type Shop, type ShopContext, type TxContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import { leaveJob } from "@/modules/access/jobs";
import { MailFailure } from "@/modules/outbound/mail/port";
import { readFile } from "./files";
import { mailPort } from "./ports";

export interface NewMail {
  /** `estimate`, `deposit-receipt`, `purchase-order`, `invoice`, `receipt` … */
  readonly kind: string;
  readonly to: string;
  readonly toName?: string;
  readonly subject: string;
  /** Paragraphs of plain text; the HTML part is made from them. */
  readonly paragraphs: readonly string[];
  readonly button?: { readonly label: string; readonly url: string };
  readonly attachmentFileIds?: readonly string[];
  readonly workOrderId?: string | null;
  readonly about: { readonly kind: string; readonly id: string };
}

const escape = (s: string) => s.replace(/[&<>"']/g, (c) => `&#${c.charCodeAt(0)};`);

function htmlOf(shop: Shop, mail: NewMail): string {
  const p = mail.paragraphs.map((t) => `<p style="margin:0 0 14px">${escape(t).replaceAll("\n", "<br>")}</p>`).join("");
  const button = mail.button
    ? `<p style="margin:22px 0"><a href="${escape(mail.button.url)}" style="background:#101715;color:#F4F8F5;padding:12px 20px;text-decoration:none;border-radius:3px;border-left:6px solid #DDF02A;font-weight:600">${escape(mail.button.label)}</a></p><p style="margin:0 0 14px;color:#4F5C57;font-size:13px">Or open this address: ${escape(mail.button.url)}</p>`
    : "";
  return `<!doctype html><html lang="en"><body style="margin:0;background:#DDE6E0;color:#101715;font:15px/1.45 Helvetica,Arial,sans-serif"><div style="max-width:560px;margin:0 auto;padding:28px 22px"><p style="margin:0 0 18px;font-weight:700;font-size:18px;border-bottom:2px solid #101715;padding-bottom:10px">${escape(shop.name)}</p>${p}${button}</div></body></html>`;
}

/** Writes a message into the shop's sent book and leaves the sending to the worker. Returns the message's id. */
export async function queueMail(ctx: TxContext, mail: NewMail): Promise<string> {
  const id = randomUUID();
  const text = [...mail.paragraphs, ...(mail.button ? [`${mail.button.label}: ${mail.button.url}`] : []), `-- \n${ctx.shop.name}`].join("\n\n");
  await ctx.tx.insert(mailMessages).values({
    shopId: ctx.shop.id, id, kind: mail.kind, toAddress: mail.to, toName: mail.toName ?? "", subject: mail.subject.replace(/[\r\n]+/g, " ").slice(0, 240),
    bodyText: text, bodyHtml: htmlOf(ctx.shop, mail), attachmentFileIds: [...(mail.attachmentFileIds ?? [])], workOrderId: mail.workOrderId ?? null,
    subjectKind: mail.about.kind, subjectId: mail.about.id, queuedBy: ctx.actor.name, at: ctx.now,
  });
  await leaveJob(ctx, "mail.send", { mailId: id }, { dedupeKey: id });
  return id;
}

/**
 * Job: sends a queued message once. Run twice it sends at most the same message under the same Message-ID.
 * A refusal for good is written on the message; one that may pass is thrown, so that the job is tried again.
 */
export async function sendQueuedMail(ctx: ShopContext, mailId: string): Promise<void> {
  const at = and(eq(mailMessages.shopId, ctx.shop.id), eq(mailMessages.id, mailId));
  const found = await withShop(ctx.shop.id, async (tx) => {
    const [mail] = await tx.select().from(mailMessages).where(at);
    const [settings] = await tx.select({ email: shopSettings.email }).from(shopSettings).where(eq(shopSettings.shopId, ctx.shop.id));
    return mail && mail.state === "queued" ? { mail, replyTo: settings?.email ?? "" } : null;
  });
  if (!found) return;
  const { mail, replyTo } = found;
  const attachments = await Promise.all(mail.attachmentFileIds.map((fileId) => readFile(ctx, fileId)));
  const set = (values: Partial<typeof mailMessages.$inferInsert>) => withShop(ctx.shop.id, (tx) => tx.update(mailMessages).set(values).where(at));
  try {
    await mailPort().send({
      messageId: `<${mail.id}@${new URL(env().VK_APP_URL).hostname}>`, to: mail.toAddress, toName: mail.toName, fromName: ctx.shop.name, ...(replyTo ? { replyTo } : {}),
      subject: mail.subject, text: mail.bodyText, html: mail.bodyHtml, attachments: attachments.map((a) => ({ name: a.name, mime: a.mime, bytes: a.bytes })),
    });
    await set({ state: "sent", sentAt: ctx.now, error: null });
  } catch (error) {
    const failure = error instanceof MailFailure ? error : null;
    if (failure && !failure.retry) await set({ state: "failed", error: failure.message.slice(0, 500) });
    else {
      await set({ error: (error instanceof Error ? error.message : String(error)).slice(0, 500) });
      throw error;
    }
  }
}

export interface MailView { id: string; kind: string; to: string; subject: string; state: string; error: string | null; at: string; sentAt: string | null }

/** What was sent about a matter, newest first. */
export async function mailAbout(ctx: ShopContext, workOrderId: string): Promise<MailView[]> {
  const rows = await inShop(ctx, (tx) => tx.select().from(mailMessages)
    .where(and(eq(mailMessages.shopId, ctx.shop.id), eq(mailMessages.workOrderId, workOrderId))).orderBy(desc(mailMessages.at)).limit(50));
  return rows.map((m) => ({ id: m.id, kind: m.kind, to: m.toAddress, subject: m.subject, state: m.state, error: m.error, at: m.at.toISOString(), sentAt: m.sentAt?.toISOString() ?? null }));
}
