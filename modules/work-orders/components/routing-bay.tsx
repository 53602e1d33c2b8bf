import { dateTime, hours } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { Bay } from "@/modules/ui/bay";
import type { DialName } from "@/modules/ui/dial";
import { Flag } from "@/modules/ui/flag";
import { Lane } from "@/modules/ui/lane";
import type { PlaceFacts } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import { Tube } from "@/modules/ui/tube";
import type { OperationRow, OrderPage } from "../queries/order-page";
import { OperationMenu } from "./operation-menu";

const STATE: Record<OperationRow["state"], [DialName, string]> = { open: ["queue", "In line"], running: ["work", "Running"], done: ["out", "Done"], skipped: ["out", "Skipped"] };
/** Over the book by so many minutes is said beside the state. */
const OVER_MINUTES = 3;

/** The routing of an order: each operation with what the bench took against the book. */
export function RoutingBay({ order, place, aside }: { order: OrderPage; place: PlaceFacts; aside?: React.ReactNode }) {
  const many = order.pieces.length > 1;
  const h = (minutes: number) => (minutes === 0 ? "–" : hours(minutes, place.locale));
  return (
    <Bay label="Routing" flush aside={aside}>
      {order.operations.length === 0 ? <p className="mid px-[18px] pb-4 pt-2">{order.versions.some((v) => v.state === "sent") ? "The routing comes with the customer's yes." : "The routing comes with an agreed estimate."}</p> : (
        <Lane label="Routing">
          <table>
            <caption className="sr-only">Operations with hours worked and book hours</caption>
            <thead>
              <tr>
                <th scope="col" className="hide-s">Op</th><th scope="col">Operation</th>{many ? <th scope="col">Head</th> : null}<th scope="col" className="hide-s">Station</th><th scope="col" className="hide-s">Tech</th>
                <th scope="col" className="r">Actual</th><th scope="col" className="r">Book</th><th scope="col" className="hide-s" style={{ width: 132 }}><span className="sr-only">Actual of book</span></th><th scope="col">State</th><th scope="col"><span className="sr-only">More</span></th>
              </tr>
            </thead>
            <tbody>
              {order.operations.map((o) => {
                const [dial, word] = o.state === "open" && o.isPaused ? ["hold" as const, "Paused"] : STATE[o.state];
                const over = o.workedMinutes - o.bookMinutes;
                const cures = o.state === "open" && o.notBefore !== null && o.notBefore > order.now;
                return (
                  <tr key={o.id} className={o.state === "running" ? "sel" : undefined}>
                    <td className="q mid hide-s">{o.sequence}</td>
                    <td className="b">{o.name}{o.qtyMilli === 1000 ? "" : ` × ${milliText(o.qtyMilli)}`}</td>
                    {many ? <td className="q mid">{order.pieces.find((p) => p.id === o.pieceId)?.tag?.slice(-2) ?? o.pieceNo}</td> : null}
                    <td className="mid hide-s">{o.station}</td>
                    <td className="mid hide-s">{o.people.join(", ") || "–"}</td>
                    <td className="r q b">{h(o.workedMinutes)}</td>
                    <td className="r q mid">{h(o.bookMinutes)}</td>
                    <td className="hide-s">{o.bookMinutes > 0 && o.state !== "skipped" ? <Tube value={o.workedMinutes} mark={o.bookMinutes} /> : null}</td>
                    <td>
                      <span className="inline-flex flex-wrap items-center gap-2">
                        <Status dial={cures ? "wait" : dial}>{cures ? `Cures to ${dateTime(o.notBefore ?? "", place)}` : word}</Status>
                        {o.state === "skipped" && o.skipReason ? <span className="dim sm">{o.skipReason}</span> : null}
                        {over >= OVER_MINUTES && o.bookMinutes > 0 && o.state !== "open" ? <Flag tone="open">+{hours(over, place.locale)} h</Flag> : null}
                      </span>
                    </td>
                    <td className="r">{order.may.record && order.closedAt === null ? <OperationMenu op={o} mayOverride={order.may.override} /> : null}</td>
                  </tr>
                );
              })}
            </tbody>
          </table>
        </Lane>
      )}
    </Bay>
  );
}
