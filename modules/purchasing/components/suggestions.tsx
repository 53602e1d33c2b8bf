"use client";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { amount, currencyDecimals } from "@/modules/kernel/format";
import { minorText } from "@/modules/kernel/money";
import { milliText } from "@/modules/kernel/quantity";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { Flag } from "@/modules/ui/flag";
import { Status } from "@/modules/ui/status";
import { draftPurchaseOrderAction } from "../actions";
import { draftInput } from "../input";
import type { SuggestionGroup } from "../queries/suggestions";

/** What is short or at its reorder mark, by supplier: tick, and write the order. Nothing is ordered by itself. */
export function Suggestions({ groups, suppliers }: { groups: readonly SuggestionGroup[]; suppliers: readonly { id: string; name: string }[] }) {
  const { slug } = usePlace();
  return (
    <Bays>
      {groups.length === 0 ? <EmptyState title="Nothing is short" action={<LinkButton href={`/s/${slug}/parts`}>To the parts</LinkButton>}>Parts land here when an order needs more than the shelf has and nothing is on its way, or at their reorder mark.</EmptyState>
        : groups.map((g) => <Group key={g.supplierId ?? "none"} group={g} suppliers={suppliers} />)}
      <Bay label="By hand"><EmptyOrder suppliers={suppliers} /></Bay>
    </Bays>
  );
}

function Group({ group, suppliers }: { group: SuggestionGroup; suppliers: readonly { id: string; name: string }[] }) {
  const place = usePlace();
  const { slug } = place;
  const router = useRouter();
  const [ticked, setTicked] = useState<ReadonlySet<string>>(() => new Set(group.rows.map((r) => r.key)));
  const chosen = group.rows.filter((r) => ticked.has(r.key));
  const decimals = currencyDecimals(place.currency);
  const form = useCommandForm({
    schema: draftInput, guard: false, defaultValues: { supplierId: group.supplierId ?? "", neededBy: "", notes: "", lines: [] },
    action: ({ requestId, input }) => draftPurchaseOrderAction(slug, {
      requestId, input: { ...input, lines: chosen.map((r) => ({ id: "", partId: r.partId, supplierNumber: r.supplierNumber, qty: milliText(r.qtyMilli), price: r.lastPriceMinor === null ? "" : minorText(r.lastPriceMinor, decimals), workOrderId: r.workOrderId ?? "" })) },
    }),
    onDone: (v) => router.push(`/s/${slug}/purchases/${v.id}`),
  });
  const toggle = (key: string) => setTicked((old) => { const next = new Set(old); if (!next.delete(key)) next.add(key); return next; });
  return (
    <Bay label={group.supplierName} flush aside={group.leadDays === null ? undefined : <span className="mid sm">{`takes ${group.leadDays} days`}</span>}>
      <CommandForm form={form} label={`Order from ${group.supplierName}`} toFix="before the order is written">
        <table className="calm">
          <caption className="sr-only">{`To buy from ${group.supplierName}`}</caption>
          <thead><tr><th className="chk" style={{ width: 44 }}><span className="sr-only">Take</span></th><th className="w2">No.</th><th>Part</th><th>For</th><th className="r">Free</th><th className="r">Buy</th>{group.rows.some((r) => r.lastPriceMinor !== null) ? <th className="r hide-s">Last paid</th> : null}</tr></thead>
          <tbody>{group.rows.map((r) => (
            <tr key={r.key}>
              <td className="chk"><span className="tick"><input type="checkbox" checked={ticked.has(r.key)} onChange={() => toggle(r.key)} aria-label={`Buy ${r.sku}${r.workOrderNumber ? ` for ${r.workOrderNumber}` : ""}`} /></span></td>
              <td className="q mid w2 nw">{r.sku}</td><td className="b">{r.description}</td><td>{r.why === "short" ? <Flag tone="open">{r.workOrderNumber ?? "Short"}</Flag> : <Status dial="work">Reorder</Status>}</td>
              <td className="r q">{qtyText(r.freeMilli, r.stockUnit)}</td><td className="r q b">{qtyText(r.qtyMilli, r.stockUnit)}</td>{group.rows.some((x) => x.lastPriceMinor !== null) ? <td className="r q mid hide-s">{r.lastPriceMinor === null ? "" : amount(r.lastPriceMinor, place)}</td> : null}
            </tr>
          ))}</tbody>
        </table>
        <div style={{ padding: 14, display: "flex", gap: 12, alignItems: "end", flexWrap: "wrap" }}>
          {group.supplierId === null ? <SelectInput name="supplierId" label="Buy from" options={[{ value: "", label: "Choose a supplier" }, ...suppliers.map((s) => ({ value: s.id, label: s.name }))]} /> : null}
          <Button type="submit" pending={form.pending} pendingText="Writing…" {...(chosen.length === 0 ? { disabledReason: "Tick at least one line." } : {})}>{`Write order, ${chosen.length} ${chosen.length === 1 ? "line" : "lines"}`}</Button>
        </div>
      </CommandForm>
    </Bay>
  );
}

function EmptyOrder({ suppliers }: { suppliers: readonly { id: string; name: string }[] }) {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({ schema: draftInput, guard: false, defaultValues: { supplierId: "", neededBy: "", notes: "", lines: [] }, action: (sent) => draftPurchaseOrderAction(slug, sent), onDone: (v) => router.push(`/s/${slug}/purchases/${v.id}`) });
  return (
    <CommandForm form={form} label="Order by hand" toFix="before the order is written">
      <div style={{ display: "flex", gap: 12, alignItems: "end", flexWrap: "wrap" }}>
        <SelectInput name="supplierId" label="Supplier" options={[{ value: "", label: "Choose a supplier" }, ...suppliers.map((s) => ({ value: s.id, label: s.name }))]} />
        <SubmitButton pendingText="Writing…">Write an empty order</SubmitButton>
        <LinkButton href={`/s/${slug}/purchases/suppliers/new`} variant="lo">Add a supplier</LinkButton>
      </div>
    </CommandForm>
  );
}
