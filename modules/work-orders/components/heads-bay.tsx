"use client";

import Link from "next/link";
import { dateTime, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import { Kv, type Pair } from "@/modules/ui/kv";
import { usePlace } from "@/modules/ui/place";
import { Tag } from "@/modules/ui/tag";
import { endHoldAction } from "../actions";
import type { PieceRow } from "../queries/order-page";
import { AddPieceDialog, HoldDialog } from "./order-dialogs";
import { useToastAct } from "./use-toast-act";

/** The heads of an order: where each is, what holds it, what may be done with it. */
export function HeadsBay({ number, orderId, pieces, isOpen, may }: { number: string; orderId: string; pieces: readonly PieceRow[]; isOpen: boolean; may: { receive: boolean; release: boolean } }) {
  const place = usePlace();
  const { act, pending } = useToastAct();
  return (
    <Bay label={pieces.length === 1 ? "Head" : "Heads"}>
      <ul>
        {pieces.map((p, i) => {
          const at = `/s/${place.slug}/orders/${number}`;
          const label = p.tag ?? `head ${p.pieceNo}`;
          const pairs: Pair[] = [
            ["Family", p.family], ...(p.castingNumber || p.serial ? [["Casting", `${p.castingNumber} ${p.serial}`.trim()] as Pair] : []),
            ...(p.declaredValueMinor === null ? [] : [["Declared", money(p.declaredValueMinor, place)] as Pair]), ...(p.place ? [["Lies at", p.place] as Pair] : []),
            ...(p.handedOverTo ? [["Left with", p.handedOverTo] as Pair] : []),
          ];
          return (
            <li key={p.id} className={i === 0 ? undefined : "mt-4 border-t border-line pt-4"}>
              <div className="mb-2 flex items-center justify-between gap-3">
                {p.tag ? <Tag running={p.running !== null} href={`${at}/pieces/${p.pieceNo}`}>{p.tag}</Tag> : <Link className="lk" href={`${at}/pieces/${p.pieceNo}`}>Head {p.pieceNo}</Link>}
                <span className="sm mid">{p.running ? `${p.next?.station ?? ""}, ${p.running.person}` : p.status.station ? `${p.status.station}, ${p.status.word.toLowerCase()}` : p.status.word}</span>
              </div>
              <Kv pairs={pairs} />
              {p.holds.map((h) => (
                <p key={h.id} className="sm mt-2 flex flex-wrap items-center gap-2">
                  <b className="b">On hold, {h.reason}</b> <span className="mid">{[h.words, h.by, dateTime(h.since, place)].filter(Boolean).join(", ")}</span>
                  <Button size="sm" pending={pending} onClick={() => void act((requestId) => endHoldAction(place.slug, { requestId, input: { holdId: h.id } }), () => `${label} may go on`)}>End hold</Button>
                </p>
              ))}
              {p.handedOverAt === null && isOpen ? (
                <div className="mt-3 flex flex-wrap gap-2">
                  {!p.bookedInAt && may.receive ? <LinkButton size="sm" icon="box" href={`${at}/receive/${p.pieceNo}`}>Book in</LinkButton> : null}
                  {p.bookedInAt && !p.releasedAt && may.release ? <LinkButton size="sm" icon="check" href={`${at}/pieces/${p.pieceNo}/inspect`}>Inspect</LinkButton> : null}
                  {p.bookedInAt && !p.releasedAt ? <HoldDialog piece={{ id: p.id, label, declaredMinor: p.declaredValueMinor }} /> : null}
                </div>
              ) : null}
            </li>
          );
        })}
      </ul>
      {isOpen && may.receive ? <div className="mt-4"><AddPieceDialog orderId={orderId} family={pieces[0]?.family ?? ""} /></div> : null}
    </Bay>
  );
}
