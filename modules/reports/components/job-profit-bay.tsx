import { ableTo, type ShopContext } from "@/modules/access/context";
import { amount, date, decimal, hours, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Num } from "@/modules/ui/num";
import { TextLink } from "@/modules/ui/text-link";
import { jobProfitOf, type ProfitRow } from "../queries";

/** Profit of a job, each figure opening to its rows. Only for who may see it; nobody else gets a trace. */
export async function JobProfitBay({ ctx, workOrderId }: { ctx: ShopContext; workOrderId: string }) {
  if (!ableTo(ctx, "profit.see")) return null;
  const v = await jobProfitOf(ctx, workOrderId);
  const { shop } = ctx;
  const a = (minor: number) => amount(minor, shop);
  const rowsOf = ({ name, minor, rows }: { name: string; minor: number; rows: readonly ProfitRow[] }) => (
    <details className="border-b border-line py-1">
      <summary className="flex cursor-pointer justify-between gap-3"><span>{name}</span><b className="q">{a(minor)}</b></summary>
      {rows.length === 0 ? <p className="sm mid py-1">No rows.</p> : rows.map((r, i) => (
        <p key={i} className="sm flex justify-between gap-3 py-0.5"><span>{r.invoiceId ? <TextLink href={`/s/${shop.slug}/books/invoices/${r.invoiceId}`}>{r.text}</TextLink> : r.text}{r.date ? <span className="mid"> {date(r.date, shop.locale)}</span> : null}</span><span className="q">{a(r.amountMinor)}</span></p>
      ))}
    </details>
  );
  return (
    <Bay label="Profit of this job">
      <div className="flex items-end justify-between gap-3"><Num size="m">{money(v.profitMinor, shop)}</Num><span className="unit">{v.marginBp === null ? "–" : `${decimal(v.marginBp / 100, 2, shop.locale)} %`}</span></div>
      {v.isBilled ? null : <p className="sm mid">Not billed yet: only costs so far.</p>}
      <div className="mt-2">
        {rowsOf({ name: "Net sales", minor: v.netSalesMinor, rows: v.rows.sales })}
        {rowsOf({ name: "Parts", minor: -v.partsMinor, rows: v.rows.parts })}
        <details className="border-b border-line py-1">
          <summary className="flex cursor-pointer justify-between gap-3"><span>Loaded labor, {hours(v.minutes, shop.locale, 2)} h</span><b className="q">{a(-v.loadedLaborMinor)}</b></summary>
          {v.rows.labor.map((l, i) => <p key={i} className="sm flex justify-between gap-3 py-0.5"><span>{l.name}, {l.minutes} min</span><span className="q">{l.costMinor === null ? "" : a(l.costMinor)}</span></p>)}
          <p className="sm flex justify-between gap-3 py-0.5"><span>Burden</span><span className="q">{a(v.burdenMinor)}</span></p>
        </details>
        {v.outsideMinor === 0 ? null : rowsOf({ name: "Outside services", minor: -v.outsideMinor, rows: v.rows.outside })}
        {rowsOf({ name: "Freight out", minor: -v.freightOutMinor, rows: v.rows.freightOut })}
        {rowsOf({ name: "Payment fees", minor: -v.paymentFeesMinor, rows: v.rows.fees })}
      </div>
    </Bay>
  );
}
