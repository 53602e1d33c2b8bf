import { randomUUID } from "node:crypto";
import { openLink } from "@/modules/access/link";
import { orNotFound } from "@/modules/access/page";
import { CustomerGain } from "@/modules/flow/components/customer-gain";
import { gainForPiece } from "@/modules/flow/queries/gain";
import { CustomerInvoice } from "@/modules/invoices/components/customer-invoice";
import { money } from "@/modules/kernel/format";
import { PayDeposit, PayInvoice } from "@/modules/payments/components/pay-link";
import { AnswerForm } from "@/modules/work-orders/components/answer-form";
import { CustomerEstimate, customerWords, WhereHeadsAre } from "@/modules/work-orders/components/customer-estimate";
import { CustomerTop } from "@/modules/work-orders/components/customer-top";
import { customerShop, customerView, provedPieces } from "@/modules/work-orders/queries/customer-view";

export const metadata = { title: "Your order", robots: { index: false, follow: false }, referrer: "same-origin" as const };

/** Pages a customer opens from a mail: one link, one matter. Unknown, expired and revoked links look alike. */
export default async function LinkPage({ params, searchParams }: { params: Promise<{ token: string }>; searchParams: Promise<{ view?: string | string[]; paid?: string | string[] }> }) {
  const { token } = await params;
  const { view: wanted, paid } = await searchParams;
  const link = await openLink(token);
  if (!link) {
    return (
      <main id="main" className="cust">
        <h1 className="mt-10">This link opens nothing</h1>
        <p className="lead">It may be mistyped, too old or ended. Take the newest mail from the shop, or call them.</p>
      </main>
    );
  }
  const { ctx } = link;
  const shop = await customerShop(ctx);
  const proved = link.workOrderId ? await provedPieces(ctx, link.workOrderId) : [];
  const gains = wanted === "gain" || proved.length > 0 ? await Promise.all(proved.map((id) => gainForPiece(ctx, id))) : [];
  const flowed = gains.filter((g) => g.ports.length > 0);
  const seeGain = flowed.length > 0 ? <p className="mt-4"><a className="btn" href={`/l/${token}?view=gain`}>See what {flowed.length === 1 ? "it" : "they"} gained</a></p> : null;
  if (link.purpose === "gain" || (wanted === "gain" && flowed.length > 0)) {
    return (
      <main id="main" className="cust">
        <CustomerTop shop={ctx.shop.name} phone={shop.phone} />
        {flowed.map((g) => <CustomerGain key={g.pieceId} gain={g} locale={ctx.shop.locale} zone={ctx.shop.zone} />)}
        {flowed.length === 0 ? <h1>Nothing is measured yet</h1> : null}
        <p className="mt-6"><a className="lk" href={`/l/${token}`}>Back to your order</a></p>
      </main>
    );
  }
  if (link.purpose === "invoice") {
    return (
      <main id="main" className="cust">
        <CustomerTop shop={ctx.shop.name} phone={shop.phone} />
        <CustomerInvoice ctx={ctx} pdfHref={`/l/${token}/paper`} />
        {seeGain}
        <PayInvoice token={token} justPaid={paid !== undefined} />
      </main>
    );
  }
  const view = await orNotFound(customerView(ctx));
  const { snapshot: s } = view;
  const { heading, lead } = customerWords(view);
  const deposit = s.depositMinor === 0 ? "No deposit is asked." : s.depositStands ? "No second deposit is asked." : `A deposit of ${money(s.depositMinor, s)} is due with your yes.`;
  return (
    <main id="main" className="cust">
      <CustomerTop shop={ctx.shop.name} phone={shop.phone} />
      <CustomerEstimate view={view} token={token} zone={ctx.shop.zone} heading={heading} lead={lead}>
        {view.standing === "approved" ? <PayDeposit token={token} justPaid={paid !== undefined} /> : null}
        {view.standing === "approved" || view.standing === "replaced" || view.standing === "closed" ? <WhereHeadsAre view={view} token={token} /> : null}
        {seeGain}
      </CustomerEstimate>
      {view.standing === "open" ? (
        <AnswerForm token={token} requestId={randomUUID()} documentHash={view.documentHash} words={s.words} mail={shop.email} approveLabel={`Approve ${money(s.totals.totalMinor, s)}`} hint={`${deposit} We call before anything costs more.`} />
      ) : null}
    </main>
  );
}
