import "server-only";
import { sendQueuedMail } from "@/modules/documents/mail";
import { makeEstimatePaper } from "@/modules/work-orders/commands/estimate-paper";
import type { Task } from "@/modules/access/jobs";
import type { Handler } from "./queue";

const text = (payload: Record<string, unknown>, key: string): string => {
  const value = payload[key];
  if (typeof value !== "string") throw new Error(`job without ${key}`);
  return value;
};

/** What each task does. Every one is safe to run twice. */
export const handlers: Partial<Record<Task, Handler>> = {
  "mail.send": (ctx, payload) => sendQueuedMail(ctx, text(payload, "mailId")),
  "estimates.paper": (ctx, payload) => makeEstimatePaper(ctx, text(payload, "estimateId")),
};
