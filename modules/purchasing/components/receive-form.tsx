"use client";
import { useRouter } from "next/navigation";
import { amount } from "@/modules/kernel/format";
import { milliText, parseMilli } from "@/modules/kernel/quantity";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { unitMark } from "@/modules/stock/domain/part-words";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Icon } from "@/modules/ui/icon";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { useWatch } from "react-hook-form";
import { receiveGoodsAction } from "../actions";
import { receiveInput } from "../input";
import type { OrderDetail } from "../queries/orders";

/** The lines of a sent order with a well for what came: type, Tab, F9. Lot and date are asked for where a part keeps them. */
export function ReceiveForm({ order }: { order: OrderDetail }) {
  const place = usePlace();
  const { slug, currency } = place;
  const router = useRouter();
  const toast = useToast();
  const open = order.lines.filter((l) => l.openMilli > 0);
  const form = useCommandForm({
    schema: receiveInput, draft: `take-in-${order.id}-${order.version}`,
    defaultValues: { purchaseOrderId: order.id, freight: "", deliveryNote: "", lines: open.map((l) => ({ lineId: l.id, came: "", lotCode: "", expiresOn: "", over: "" as const })) },
    action: (sent) => receiveGoodsAction(slug, sent),
    onDone: (v) => { toast({ text: `Taken in as ${v.number}${v.surplus.length ? `. ${v.surplus.join(", ")}` : ""}` }); router.refresh(); },
  });
  const typed = useWatch({ control: form.rhf.control, name: "lines" });
  const fillAll = () => open.forEach((l, i) => form.rhf.setValue(`lines.${i}.came`, milliText(l.openMilli), { shouldDirty: true }));
  const seesPrice = order.partsMinor !== null;
  return (
    <CommandForm form={form} label="Take in delivery" toFix="before it is taken in">
      <table className="calm">
        <caption className="sr-only">Lines still to come</caption>
        <thead><tr><th className="w2">No.</th><th>Part</th><th className="w2">For</th><th className="r">Open</th><th className="r">Came</th>{seesPrice ? <th className="r hide-s">{`Each ${currency}`}</th> : null}</tr></thead>
        <tbody>
          {open.map((l, i) => {
            const over = (parseMilli(String(typed?.[i]?.came ?? "")) ?? 0) > l.openMilli;
            return (
              <tr key={l.id}>
                <td className="q mid w2 nw">{l.sku}</td>
                <td className="b" style={{ paddingBlock: 12 }}>
                  {l.description}
                  {l.waiting.map((w) => <span key={w.number} className="sm mid" style={{ display: "flex", alignItems: "center", gap: 5, fontWeight: 400 }}><Icon name="clock" size={13} />{`${w.number} waits for ${qtyText(w.shortMilli, l.stockUnit)}`}</span>)}
                  {l.lotTracked ? <div className="grid gap-2" style={{ gridTemplateColumns: "repeat(auto-fit, minmax(120px, 1fr))", marginTop: 8, fontWeight: 400 }}><TextInput name={`lines.${i}.lotCode`} label="Lot" /><DateInput name={`lines.${i}.expiresOn`} label="Expires" /></div> : null}
                  {over ? <div style={{ marginTop: 8, fontWeight: 400 }}><SelectInput name={`lines.${i}.over`} label="More than ordered: what becomes of it?" options={[{ value: "", label: "Choose" }, { value: "keep", label: "Keep it" }, { value: "return", label: "Send it back" }, { value: "refuse", label: "Refused at the door" }]} /></div> : null}
                </td>
                <td className="mid w2">{l.workOrderNumber ?? "Stock"}</td>
                <td className="r q">{qtyText(l.openMilli, l.stockUnit)}</td>
                <td style={{ width: 160, paddingBlock: 7 }}><NumberInput name={`lines.${i}.came`} label={`Came, ${l.sku}`} hideLabel alignEnd unit={unitMark(l.stockUnit) || undefined} autoFocus={i === 0} /></td>
                {seesPrice ? <td className="r q hide-s">{l.unitPriceMinor === null ? "" : amount(l.unitPriceMinor, place)}</td> : null}
              </tr>
            );
          })}
        </tbody>
      </table>
      <div style={{ padding: 14 }}>
        <div className="fields">
          <MoneyInput name="freight" label="Freight on this delivery" currency={currency} optional hint="Shared over the lines by value." />
          <TextInput name="deliveryNote" label="Delivery note" optional />
        </div>
        <div className="form-act"><Button variant="lo" onClick={fillAll}>All of it came</Button><SubmitButton hotkey="F9" pendingText="Taking in…">Take in delivery</SubmitButton></div>
      </div>
    </CommandForm>
  );
}
