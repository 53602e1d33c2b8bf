import { amount, money } from "@/modules/kernel/format";
import type { ShopContext } from "@/modules/access/context";
import { Bay } from "@/modules/ui/bay";
import { SumList } from "@/modules/ui/kv";
import { Num } from "@/modules/ui/num";
import { TextLink } from "@/modules/ui/text-link";
import { orderMoneyOf } from "../order-money";

/** MONEY SO FAR of an order: what is left to pay, how it is made up, its invoices. For who may see prices. */
export async function OrderMoney({ ctx, workOrderId }: { ctx: ShopContext; workOrderId: string }) {
  const v = await orderMoneyOf(ctx, workOrderId);
  if (!v) return null;
  const { shop } = ctx;
  const a = (minor: number) => amount(minor, shop);
  return (
    <Bay label="Money so far">
      <div className="flex items-end justify-between gap-3">
        <Num size="m">{money(v.leftMinor, shop)}</Num>
        <span className="unit">{v.isBilled && v.leftMinor <= 0 ? "Paid" : "Left to pay"}</span>
      </div>
      <SumList
        lines={[
          ...v.sums.map((s) => ({ name: s.name, value: a(s.minor), ...(s.strong ? { total: true } : {}) })),
          ...(v.depositMinor > 0 ? [{ name: "Deposit", value: a(-v.depositMinor) }] : []),
          ...(v.paidMinor > 0 ? [{ name: "Paid", value: a(-v.paidMinor) }] : []),
        ]}
      />
      {v.costMinor === null ? null : <p className="sm mid mt-2">Parts in work at cost: {money(v.costMinor, shop)}</p>}
      {v.invoices.map((i) => (
        <p key={i.id} className="sm mt-1">
          {v.seesBooks ? <TextLink href={`/s/${shop.slug}/books/invoices/${i.id}`}>{i.number ?? "Draft invoice"}</TextLink> : (i.number ?? "Draft invoice")}
          {i.state === "issued" ? `, ${i.openMinor > 0 ? `${money(i.openMinor, shop)} open` : i.kind === "credit" ? "credit" : "paid"}` : ""}
        </p>
      ))}
    </Bay>
  );
}
