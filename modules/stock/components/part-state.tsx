import { date } from "@/modules/kernel/format";
import { Flag } from "@/modules/ui/flag";
import { Icon } from "@/modules/ui/icon";
import { Status } from "@/modules/ui/status";
import { qtyText } from "../domain/qty-text";
import type { PartRow } from "../queries/find-parts";

/** One word on a part: short, expiring, to reorder, enough. */
export function PartState({ part, locale }: { part: PartRow; locale: string }) {
  if (!part.active) return <Status dial="out" dim>No longer kept</Status>;
  if (part.isKit) return part.freeMilli > 0 ? <Status dial="ready">{`${part.freeMilli / 1000} can be made`}</Status> : <Flag>{part.kitShort.length ? `No ${part.kitShort[0] ?? ""}` : "Nothing in it"}</Flag>;
  if (part.shortMilli > 0) return <Flag>{`${qtyText(part.shortMilli, part.stockUnit)} short`}</Flag>;
  if (part.expiredMilli > 0) return <span className="st"><Icon name="warn" size={16} />{`${qtyText(part.expiredMilli, part.stockUnit)} expired`}</span>;
  if (part.expiringMilli > 0 && part.nextExpiry) return <span className="st"><Icon name="warn" size={16} />{`Expires ${date(part.nextExpiry, locale)}`}</span>;
  if (part.reorderPointMilli !== null && part.freeMilli <= part.reorderPointMilli) return <Status dial="work">Reorder</Status>;
  if (part.onHandMilli === 0) return <Status dial="queue" dim>None</Status>;
  return <Status dial="ready">Enough</Status>;
}
