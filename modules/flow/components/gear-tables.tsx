import Link from "next/link";
import type { ReactNode } from "react";
import { date, decimal } from "@/modules/kernel/format";
import { Flag } from "@/modules/ui/flag";
import { Status } from "@/modules/ui/status";
import { valveListWords } from "../domain/valve-list";
import type { GearRoom } from "../queries/gear";
import { BENCH_SCALE_SHORT } from "./gear-words";
import { Lane } from "@/modules/ui/lane";

export type GearView = "benches" | "plates" | "fixtures" | "lift" | "camshafts" | "families";
interface TableProps { room: GearRoom; slug: string; locale: string; edit: string | null; when: (iso: string) => string }
interface Row { id: string; cells: ReactNode[]; active: boolean }

const lift = (um: number | null, locale: string) => (um === null ? "—" : `${decimal(um / 1000, 2, locale)} mm`);

function rowsOf(view: GearView, { room, locale, slug, when }: TableProps): { heads: [string, boolean?][]; rows: Row[]; caption: string } {
  const n = (v: number | null, digits = 1) => (v === null ? "—" : decimal(v, digits, locale));
  switch (view) {
    case "benches":
      return {
        caption: "Benches", heads: [["Bench"], ["Scale"], ["Pressures", true], ["Factor", true], ["Last check"]],
        rows: room.benches.map((b) => ({
          id: b.id, active: b.active, cells: [
            <Link key="l" className="lk" href={`/s/${slug}/flow/gear/${b.id}`}>{b.name}</Link>, BENCH_SCALE_SHORT[b.scale], b.nominalPressuresInH2O.join(", "), n(b.check?.factor ?? 1, 4),
            b.check === null ? <Flag key="f" icon="warn">never checked</Flag> : b.check.isOld ? <Flag key="f" icon="warn">{`check ${when(b.check.at)} too old`}</Flag> : <Status key="f" dial="ready">{when(b.check.at)}</Status>,
          ],
        })),
      };
    case "plates":
      return {
        caption: "Check plates", heads: [["Serial"], ["Certified CFM", true], ["At in H₂O", true], ["Certificate"], ["Due"]],
        rows: room.plates.map((p) => ({ id: p.id, active: p.active, cells: [p.serial, n(p.referenceFlowCfm), n(p.atPressureInH2O, 0), p.certificate || "none on record", p.dueOn === null ? "no date" : p.isOverdue ? <Flag key="f" icon="warn">{`${date(p.dueOn, locale)}, overdue`}</Flag> : date(p.dueOn, locale)] })),
      };
    case "fixtures":
      return {
        caption: "Bore adapters and plates", heads: [["Bore adapter"], ["Bore mm", true], ["Length mm", true], ["Head pattern"], ["Adapter plate"]],
        rows: room.fixtures.map((f) => ({ id: f.id, active: f.active, cells: [f.name, n(f.boreMm), n(f.lengthMm, 0), f.headPattern || "—", f.plate || "—"] })),
      };
    case "lift":
      return {
        caption: "Lift devices", heads: [["Device"], ["Reads to mm", true], ["Set to within mm", true]],
        rows: room.liftDevices.map((d) => ({ id: d.id, active: d.active, cells: [d.name, n(d.resolutionMm, 3), n(d.uncertaintyMm, 3)] })),
      };
    case "camshafts":
      return {
        caption: "Camshafts", heads: [["Camshaft"], ["Side"], ["Lift", true], ["Duration", true], ["Known from"]],
        rows: room.camshafts.map((c) => ({ id: c.id, active: c.active, cells: [c.label, c.side, lift(c.maxLiftUm, locale), c.durationDeg === null ? "—" : `${n(c.durationDeg, 0)}°`, c.profile.length > 0 ? `table of ${c.profile.length} points` : "lift and duration only"] })),
      };
    case "families":
      return {
        caption: "Engine families", heads: [["Family"], ["Cyl.", true], ["Bore × stroke", true], ["Intake valves"], ["Exhaust valves"], ["Cam lift in / ex", true]],
        rows: room.families.map((f) => ({ id: f.id, active: true, cells: [f.name, String(f.cylinders), f.boreMm === null ? "—" : `${n(f.boreMm)} × ${n(f.strokeMm)}`, valveListWords(f.valves, "intake") || "—", valveListWords(f.valves, "exhaust") || "—", `${lift(f.camLiftIntakeUm, locale)} / ${lift(f.camLiftExhaustUm, locale)}`] })),
      };
  }
}

/** One kind of gear as a table; a name opens its form beside. */
export function GearTable({ view, ...props }: TableProps & { view: GearView }) {
  const { heads, rows, caption } = rowsOf(view, props);
  const { room, slug, edit } = props;
  if (rows.length === 0) return null;
  return (
    <Lane label={caption}>
      <table className="calm">
        <caption className="sr-only">{caption}</caption>
        <thead><tr>{heads.map(([text, right]) => <th key={text} scope="col" className={right ? "r" : undefined}>{text}</th>)}{room.canSetUp ? <th scope="col"><span className="sr-only">Change</span></th> : null}</tr></thead>
        <tbody>
          {rows.map((r) => (
            <tr key={r.id} className={r.id === edit ? "sel" : undefined}>
              {r.cells.map((cell, i) => <td key={i} className={heads[i]?.[1] ? "r q nw" : i === 0 ? "nw" : undefined}>{i === 0 ? <b>{cell}</b> : cell}{i === 0 && !r.active ? <span className="dim sm"> put away</span> : null}</td>)}
              {room.canSetUp ? <td className="r"><Link className="lk" href={`/s/${slug}/flow/gear?view=${view}&edit=${r.id}`} scroll={false} aria-label={`Change ${typeof r.cells[0] === "string" ? r.cells[0] : "this bench"}`}>Change</Link></td> : null}
            </tr>
          ))}
        </tbody>
      </table>
    </Lane>
  );
}
