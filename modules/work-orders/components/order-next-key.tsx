import { LinkButton } from "@/modules/ui/button";
import type { OrderPage } from "../queries/order-page";
import { BeginEstimate } from "./begin-estimate";
import { AnswerDialog, LeaveDialogs } from "./order-dialogs";

/** The one filled key of an order: what comes next. `invoice` is what bills it, handed in by the page. */
export function OrderNextKey({ order, slug, invoice }: { order: OrderPage; slug: string; invoice: React.ReactNode }) {
  const at = `/s/${slug}/orders/${order.number}`;
  const { may } = order;
  if (order.closedAt || order.cancelledAt) return null;
  const draft = order.versions.find((v) => v.state === "draft");
  const sent = order.versions.find((v) => v.state === "sent");
  // Versions carry prices and are not sent to everybody; the routing comes with the customer's yes.
  const agreed = order.versions.some((v) => v.state === "approved") || order.operations.length > 0;
  const waitsIn = order.pieces.find((p) => !p.bookedInAt);
  const ready = order.pieces.filter((p) => p.releasedAt && !p.handedOverAt);
  const answer = sent && may.approve ? <AnswerDialog estimateId={sent.id} version={sent.estimateNo} totalMinor={sent.totalMinor ?? 0} customer={order.customer.name} phone={order.customer.phone} variant={agreed ? "plain" : "go"} /> : null;
  if (draft && may.estimate) return <>{answer}<LinkButton variant="go" href={`${at}/estimate`}>Go on with version {draft.estimateNo}</LinkButton></>;
  if (!agreed) return sent ? answer : may.estimate ? <BeginEstimate orderId={order.id} number={order.number} label="Write the estimate" variant="go" /> : waitsIn && may.receive ? <LinkButton variant="go" icon="box" href={`${at}/receive/${waitsIn.pieceNo}`}>Book in</LinkButton> : null;
  if (waitsIn && may.receive) return <>{answer}<LinkButton variant="go" icon="box" href={`${at}/receive/${waitsIn.pieceNo}`}>Book in</LinkButton></>;
  if (ready.length > 0 && ready.length === order.pieces.filter((p) => !p.handedOverAt).length) {
    const names = ready.map((p) => ({ id: p.id, label: p.tag ?? `head ${p.pieceNo}`, declaredMinor: p.declaredValueMinor }));
    const left = order.money?.leftMinor ?? 0;
    return <>{invoice}{may.ship ? <LeaveDialogs orderId={order.id} customer={order.customer.name} pieces={names} owedMinor={order.customer.terms !== "receipt" && (order.money?.invoices ?? 0) > 0 ? 0 : left} mayUnpaid={may.unpaid} /> : null}</>;
  }
  return answer;
}
