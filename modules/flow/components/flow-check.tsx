import Link from "next/link";
import { decimal } from "@/modules/kernel/format";
import type { ShopContext } from "@/modules/access/context";
import { Bay } from "@/modules/ui/bay";
import type { GainOfPiece, PortGain, SideGain } from "../domain/side-gain";
import { gainForPiece } from "../queries/gain";
import { differenceText, liftWords } from "./flow-words";
import { withheldWords } from "./gain-words";
import { MiniCurve } from "./mini-curve";

function SideFigure({ gain, locale }: { gain: SideGain; locale: string }) {
  if (!gain.comparable) return null;
  const isLoss = gain.meanGainCfm < 0;
  return (
    <span className="nw">
      <b className="num n-s">{differenceText(gain.meanGainCfm, locale, 2)}</b> <span className="unit">CFM mean {gain.side}{isLoss ? ", a loss" : ""}{gain.meanPercent === null ? "" : `, ${decimal(gain.meanPercent, 2, locale)} %`}</span>
      {gain.losses.length === 0 ? null : <span className="flag">▼ loss at {gain.losses.map((l) => liftWords(l.liftUm, gain.liftUnit, locale)).join(", ")}</span>}
    </span>
  );
}

/** One port in the bay of an order. Pure: what it may say is in `port`. */
export function FlowCheckPort({ port, locale }: { port: PortGain; locale: string }) {
  const withheld = [port.intake, port.exhaust].flatMap((g) => withheldWords(g) ?? []);
  return (
    <div className="grid gap-3">
      <MiniCurve port={port} locale={locale} />
      <p className="flex flex-wrap gap-x-5 gap-y-2">
        <SideFigure gain={port.intake} locale={locale} />
        <SideFigure gain={port.exhaust} locale={locale} />
      </p>
      {withheld.length === 0 ? null : <p className="hint">{withheld.join(" ")}</p>}
    </div>
  );
}

/** The bay FLOW CHECK of an order page: one curve a head, its first tested port. Renders nothing without a head that was flowed. */
export async function FlowCheck({ ctx, pieceIds }: { ctx: ShopContext; pieceIds: readonly string[] }) {
  const gains: GainOfPiece[] = [];
  for (const id of pieceIds) gains.push(await gainForPiece(ctx, id));
  const shown = gains.filter((g) => g.ports.length > 0);
  if (shown.length === 0) return null;
  return (
    <>
      {shown.map((gain) => {
        const [port] = gain.ports;
        if (!port || !gain.headId) return null;
        return (
          <Bay
            key={gain.pieceId} label={`Flow check, ${gain.mark}${gain.ports.length > 1 ? ` port ${port.cylinder}` : ""}`}
            aside={<Link className="lk" href={`/s/${ctx.shop.slug}/flow/${gain.headId}`}>{gain.ports.length > 1 ? `All ${gain.ports.length} ports` : "Flow sheet"}</Link>}
          >
            <FlowCheckPort port={port} locale={ctx.shop.locale} />
          </Bay>
        );
      })}
    </>
  );
}
