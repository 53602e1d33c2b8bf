import { amount, date, money } from "@/modules/kernel/format";
import type { ShopContext } from "@/modules/access/context";
import { printCreditorReference } from "../domain/creditor-reference";
import { invoiceSums } from "../domain/invoice-sums";
import { invoiceForCustomer } from "../queries";

/** The invoice behind a customer's link: what is left to pay and how it comes about. The key that pays stands beside it. */
export async function CustomerInvoice({ ctx, pdfHref }: { ctx: ShopContext; pdfHref: string }) {
  const view = await invoiceForCustomer(ctx);
  const { snapshot: s } = view;
  const p = { locale: s.locale, currency: s.currency };
  return (
    <>
      <h1>{view.openMinor <= 0 ? "Paid, thank you" : view.isReady ? "Ready to pick up" : `Invoice ${s.number ?? ""}`}</h1>
      <p className="lead">{view.isReady ? `${s.pieces.length === 1 ? "Your head is" : "Your heads are"} finished and inspected.` : `Order ${s.orderNumber}, ${date(s.date, s.locale)}.`}</p>
      <div className="cust-sum"><span className="eng">Left to pay, invoice {s.number}</span><span className="num">{money(Math.max(0, view.openMinor), p)}</span></div>
      <section>
        {invoiceSums(s).map((x) => <div key={x.name} className={x.strong ? "row-l t" : "row-l"}><span>{x.name}</span><b className="q">{amount(x.minor, p)}</b></div>)}
        {view.credits.map((c) => <div key={c.number} className="row-l"><span>Credit note {c.number}</span><b className="q">{amount(c.totalMinor, p)}</b></div>)}
      </section>
      {s.refused.length ? <section><h2 className="eng ink">Found, and not wanted</h2>{s.refused.map((r) => <p key={r.words} className="sm mid mt-2">{r.words}</p>)}</section> : null}
      {view.openMinor > 0 ? (
        <section>
          <h2 className="eng ink">How</h2>
          <div className="row-l"><span>Card<small>With the key below</small></span></div>
          <div className="row-l"><span>From your bank<small>Give the reference {s.reference ? printCreditorReference(s.reference) : s.number}</small></span></div>
          <div className="row-l"><span>At the counter<small>Cash or check</small></span></div>
        </section>
      ) : null}
      {view.hasPdf ? <p className="hint mt-4"><a className="lk" href={pdfHref}>See the full invoice</a></p> : null}
    </>
  );
}
