import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { InvoiceSheet } from "@/modules/invoices/components/invoice-sheet";
import { InvoiceSteps } from "@/modules/invoices/components/invoice-steps";
import { getInvoice } from "@/modules/invoices/queries";
import { PaymentsBay } from "@/modules/payments/components/payments-bay";
import { paymentsFor } from "@/modules/payments/queries";
import { Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Flag } from "@/modules/ui/flag";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Invoice" };

export default async function InvoicePage({ params }: { params: Promise<{ shop: string; id: string }> }) {
  const ctx = await shopPage(params, "books.see");
  const { id } = await params;
  const view = await orNotFound(getInvoice(ctx, id));
  const { snapshot: s } = view;
  const base = `/s/${ctx.shop.slug}`;
  const payments = view.state === "issued" && view.kind === "invoice" ? await paymentsFor(ctx, { invoiceId: id, workOrderId: view.workOrderId }) : [];
  return (
    <main id="main" className="page">
      <PageHead
        title={view.kind === "credit" ? `Credit note for ${s.credits?.number ?? ""}` : `Invoice for order ${s.orderNumber}`}
        sub={view.state === "draft" ? <Flag tone="open">Draft, takes the next number</Flag> : s.number}
        actions={<>
          {view.pdfFileId ? <LinkButton variant="lo" icon="print" newTab prefetch={false} href={`${base}/books/invoices/${id}/pdf`}>Print</LinkButton> : null}
          <LinkButton variant="lo" href={`${base}/orders/${s.orderNumber}`}>Order {s.orderNumber}</LinkButton>
        </>}
      />
      <div className="invoice-split">
        <InvoiceSheet s={s} />
        <Bays className="noprint">
          <InvoiceSteps view={view} may={{ write: ableTo(ctx, "invoice.write"), credit: ableTo(ctx, "credit.write"), writeOff: ableTo(ctx, "bank.match"), issueUnreleased: ableTo(ctx, "handover.unpaid") }} />
          {view.state === "issued" && view.kind === "invoice" ? <PaymentsBay invoiceId={id} openMinor={view.openMinor} payments={payments} may={{ take: ableTo(ctx, "payment.take"), refund: ableTo(ctx, "refund") }} /> : null}
        </Bays>
      </div>
    </main>
  );
}
