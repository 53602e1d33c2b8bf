import { Figures } from "@/modules/ui/kv";
import { Note } from "@/modules/ui/note";
import { Tube } from "@/modules/ui/tube";
import { date } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { qtyText } from "../domain/qty-text";
import type { PartRow } from "../queries/find-parts";

/** On the shelf, promised, on order, as big figures; the shelf as a tube against its reorder mark; what expires. */
export function PartFigures({ part, locale }: { part: PartRow; locale: string }) {
  const good = Math.max(0, part.onHandMilli - part.expiredMilli);
  const full = Math.max(part.onHandMilli, (part.reorderPointMilli ?? 0) * 2, 1);
  if (part.isKit) return <Figures keep figures={[{ value: String(part.freeMilli / 1000), unit: "Can be made" }, { value: milliText(part.promisedMilli), unit: "Promised" }]} />;
  return (
    <>
      <Figures keep figures={[{ value: milliText(part.onHandMilli), unit: part.stockUnit === "each" ? "On shelf" : `On shelf, ${part.stockUnit}` }, { value: milliText(part.promisedMilli), unit: "Promised" }, { value: milliText(part.onOrderMilli), unit: "On order" }]} />
      {part.reorderPointMilli === null ? null : (
        <div style={{ margin: "18px 0 4px" }}>
          <Tube size="big" value={good} mark={full} label={`${qtyText(good, part.stockUnit)} good on the shelf, reorder at ${qtyText(part.reorderPointMilli, part.stockUnit)}`} />
          <p className="sm mid" style={{ marginTop: 6 }}>{`Reorder at ${qtyText(part.reorderPointMilli, part.stockUnit)}`}</p>
        </div>
      )}
      {part.expiredMilli > 0 ? <Note className="mt-4" title={`${qtyText(part.expiredMilli, part.stockUnit)} expired.`}>It is never offered to a job. Throw it out, with the reason.</Note>
        : part.expiringMilli > 0 && part.nextExpiry ? <Note className="mt-4" title={`${qtyText(part.expiringMilli, part.stockUnit)} expires by ${date(part.nextExpiry, locale)}.`}>{`That leaves ${qtyText(good - part.expiringMilli, part.stockUnit)}.`}</Note> : null}
    </>
  );
}
