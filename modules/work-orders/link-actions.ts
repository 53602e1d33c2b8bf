"use server";
import { ACTION_MARK, secretAction } from "@/modules/access/action";
import { linkContext } from "@/modules/access/link";
import type { Reply } from "@/modules/ui/form/reply";
import { answerByLink, type Answered } from "./commands/answer-estimate";

const answer = secretAction(answerByLink, linkContext);

/**
 * The same answer from a plain form, so that it also works in a browser without scripts. The reply is handed back to the
 * page, with the name as it was typed.
 */
export const answerFormAction = Object.assign(
  async (token: string, _before: unknown, form: FormData): Promise<{ reply: Reply<Answered>; name: string }> => {
    const text = (key: string) => { const v = form.get(key); return typeof v === "string" ? v : ""; };
    const name = text("name");
    const reply = await answer(token, { requestId: text("requestId"), input: { answer: text("answer"), name, documentHash: text("documentHash") } });
    return { reply, name };
  },
  { [ACTION_MARK]: answer[ACTION_MARK] },
);
