"use client";

import { useRouter } from "next/navigation";
import { useActionState, useEffect } from "react";
import { Icon } from "@/modules/ui/icon";
import { Note } from "@/modules/ui/note";
import { wordsOf } from "@/modules/ui/use-act";
import { answerFormAction } from "../link-actions";

/**
 * The customer's yes or no. A plain form under the page: it works without scripts, and a double tap is one answer, because
 * the page was made with one request id.
 */
export function AnswerForm({ token, requestId, documentHash, approveLabel, words, mail, hint }: { token: string; requestId: string; documentHash: string; approveLabel: string; words: string; mail: string; hint: string }) {
  const router = useRouter();
  const [state, action, pending] = useActionState(answerFormAction.bind(null, token), null);
  const reply = state?.reply ?? null;
  useEffect(() => {
    if (reply?.status === "ok") {
      window.scrollTo({ top: 0 });
      router.refresh();
    }
  }, [reply, router]);
  const nameTrouble = reply?.status === "invalid" ? reply.fields.find((f) => f.path === "name")?.message : undefined;
  const trouble = reply && reply.status !== "ok" && nameTrouble === undefined ? wordsOf(reply) : null;
  return (
    <form action={action}>
      <input type="hidden" name="requestId" value={requestId} />
      <input type="hidden" name="documentHash" value={documentHash} />
      <section>
        <h2 className="eng ink">What a yes means</h2>
        <p className="mt-2 mid">{words}</p>
      </section>
      <section>
        {trouble ? <Note tone="stop" live>{trouble}</Note> : null}
        <div className="field mt-3">
          <label htmlFor="sign">Your name, as your signature</label>
          <span className="in" style={{ minHeight: 52, fontSize: "1.0625rem" }}>
            <input id="sign" name="name" autoComplete="name" required minLength={2} maxLength={120} defaultValue={state?.name ?? ""} key={state?.name ?? ""} aria-invalid={nameTrouble ? true : undefined} aria-describedby={nameTrouble ? "sign-err sign-hint" : "sign-hint"} />
          </span>
          {nameTrouble ? <div className="err" id="sign-err"><Icon name="warn" size={16} /><span>{nameTrouble}</span></div> : null}
          <p className="hint" id="sign-hint">{hint}</p>
        </div>
        <button type="submit" name="answer" value="declined" className="btn lo mt-3" aria-disabled={pending || undefined}>No, do not do this</button>
      </section>
      <div className="dock">
        <div>
          <button type="submit" name="answer" value="approved" className="btn go xl" data-pending={pending || undefined} aria-disabled={pending || undefined} onClick={(e) => { if (pending) e.preventDefault(); }}>
            <span>{pending ? "Noting it…" : approveLabel}</span>
          </button>
          {mail ? <a className="lk" style={{ textAlign: "center", padding: 6 }} href={`mailto:${mail}`}>Ask us something first</a> : null}
        </div>
      </div>
    </form>
  );
}
