import { openLink } from "@/modules/access/link";
import { money } from "@/modules/kernel/format";
import { Note } from "@/modules/ui/note";
import { payFacts } from "../pay-facts";
import { PayKey } from "./pay-key";

/** Deposit of the order behind a customer's link: what is due, and the key that pays it. Nothing when none is due. */
export async function PayDeposit({ token, justPaid = false }: { token: string; justPaid?: boolean }) {
  const link = await openLink(token);
  const facts = link ? await payFacts(link.ctx) : null;
  if (!link || !facts || facts.purpose !== "deposit") return null;
  if (facts.openMinor <= 0) return facts.paidMinor > 0 ? <Note tone="info" title={`Deposit of ${money(facts.paidMinor, link.ctx.shop)} received.`}>Thank you. It is taken off your invoice.</Note> : null;
  if (justPaid) return <Note tone="info" live title="Thank you.">Your payment is on its way to us; the receipt comes by e-mail.</Note>;
  return (
    <>
      <div className="cust-sum"><span className="eng">Deposit due</span><span className="num">{money(facts.openMinor, link.ctx.shop)}</span></div>
      <div className="dock"><div><PayKey token={token} label={`Pay ${money(facts.openMinor, link.ctx.shop)}`} /></div></div>
    </>
  );
}

/** The open sum of the invoice behind a customer's link and the key that pays it. Always what is open now. */
export async function PayInvoice({ token, justPaid = false }: { token: string; justPaid?: boolean }) {
  const link = await openLink(token);
  const facts = link ? await payFacts(link.ctx) : null;
  if (!link || !facts || facts.purpose !== "invoice") return null;
  if (facts.openMinor <= 0) return <Note tone="info" title="Paid already.">Thank you. There is nothing left to pay.</Note>;
  if (justPaid) return <Note tone="info" live title="Thank you.">Your payment is on its way to us; the receipt comes by e-mail.</Note>;
  return <div className="dock"><div><PayKey token={token} label={`Pay ${money(facts.openMinor, link.ctx.shop)}`} /></div></div>;
}
