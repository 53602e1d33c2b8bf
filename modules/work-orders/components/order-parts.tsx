"use client";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { shortDate } from "@/modules/kernel/format";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { Flag } from "@/modules/ui/flag";
import { settles } from "@/modules/ui/form/reply";
import { Icon } from "@/modules/ui/icon";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { issueAllReadyAction } from "../parts-actions";
import type { OrderPart } from "../queries/parts";
import { AddPartDialog } from "./order-part-add";
import { OrderPartDialog } from "./order-part-dialog";

/** Parts of an order: what it needs, what went out, what waits; with the keys to issue, return and add. */
export function OrderParts({ workOrderId, rows, canIssue, pieces = [] }: {
  workOrderId: string; rows: readonly OrderPart[]; canIssue: boolean; pieces?: readonly { id: string; label: string }[];
}) {
  const { slug, locale } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const [open, setOpen] = useState<string | null>(null);
  const [adding, setAdding] = useState(false);
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const [requestId, setRequestId] = useState(() => crypto.randomUUID());
  const ready = rows.filter((r) => r.state === "ready" || r.state === "partly").length;
  const shown = rows.find((r) => r.id === open);

  const issueAll = async () => {
    setPending(true);
    setProblem(null);
    try {
      const reply = await issueAllReadyAction(slug, { requestId, input: { workOrderId } });
      if (settles(reply)) setRequestId(crypto.randomUUID());
      if (reply.status === "ok") {
        toast({ text: `Issued ${reply.value.issued.length} ${reply.value.issued.length === 1 ? "part" : "parts"}${reply.value.short.length ? `, ${reply.value.short.join(", ")} short` : ""}` });
        router.refresh();
      } else {
        setProblem(reply.status === "refused" || reply.status === "conflict" ? reply.message : reply.status === "error" ? `Not issued. Something went wrong here; reference ${reply.reference}.` : "Sign in again, then issue them.");
      }
    } catch {
      // The same request id goes out again: what was issued is not issued twice.
      setProblem("No answer came. Nothing is lost; press it again.");
    } finally {
      setPending(false);
    }
  };

  return (
    <Bay label="Parts" flush aside={canIssue ? <button type="button" className="lk" onClick={() => setAdding(true)}>Add part</button> : undefined}>
      {problem === null ? null : <div className="p-3"><Note live tone="stop">{problem}</Note></div>}
      {rows.length === 0 ? (
        <p className="mid sm" style={{ padding: "14px" }}>No parts yet. They come with the agreed estimate, or are added here.</p>
      ) : (
        <table>
          <caption className="sr-only">Parts of this order</caption>
          <thead><tr><th>Part</th><th className="r">Need</th><th className="r">Issued</th><th><span className="sr-only">State</span></th></tr></thead>
          <tbody>
            {rows.map((r) => (
              <tr key={r.id}>
                <td className="b">
                  <button type="button" className="text-left hover:underline underline-offset-[3px]" onClick={() => setOpen(r.id)}>{r.description}</button>
                  <span className="dim sm" style={{ display: "block", fontWeight: 400 }}>{[r.sku, r.bin, r.pieceNo !== null && pieces.length > 1 ? `head ${r.pieceNo}` : ""].filter(Boolean).join(", ")}</span>
                </td>
                <td className="r q">{qtyText(r.neededMilli, r.stockUnit)}</td>
                <td className="r q">{qtyText(r.issuedMilli, r.stockUnit)}</td>
                <td><NeedState row={r} locale={locale} /></td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      {canIssue && ready > 0 ? (
        <div style={{ padding: "12px 14px", borderTop: "1px solid var(--line)" }}>
          <Button variant="lo" size="sm" pending={pending} pendingText="Issuing…" onClick={() => void issueAll()}>{ready === 1 ? "Issue the one that is ready" : `Issue all ${ready} that are ready`}</Button>
        </div>
      ) : null}
      {shown ? <OrderPartDialog key={`${shown.id}:${shown.version}`} row={shown} canIssue={canIssue} onClose={() => setOpen(null)} /> : null}
      {adding ? <AddPartDialog workOrderId={workOrderId} pieces={pieces} onClose={() => setAdding(false)} /> : null}
    </Bay>
  );
}

function NeedState({ row, locale }: { row: OrderPart; locale: string }) {
  if (row.state === "issued") return <span className="st"><Icon name="check" size={16} /><span className="sr-only">Issued</span></span>;
  if (row.state === "ready") return <span className="mid">Reserved</span>;
  const when = row.arriving?.expectedOn ? `, ${shortDate(row.arriving.expectedOn, locale)}` : row.arriving ? ", on order" : "";
  return <Flag>{`${qtyText(row.shortMilli, row.stockUnit)} short${when}`}</Flag>;
}
