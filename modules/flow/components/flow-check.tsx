import Link from "next/link";
import { decimal } from "@/modules/kernel/format";
import type { ShopContext } from "@/modules/access/context";
import { Bay } from "@/modules/ui/bay";
import type { GainOfPiece, PortGain, SideGain } from "../domain/side-gain";
import { gainForPiece } from "../queries/gain";
import { issuedReports } from "../queries/issued-reports";
import { differenceText, liftWords } from "./flow-words";
import { IssuedReports } from "./issued-reports";
import { withheldWords } from "./gain-words";
import { noiseWords } from "./noise-verdicts";
import { MiniCurve } from "./mini-curve";

function SideFigure({ gain, locale }: { gain: SideGain; locale: string }) {
  if (!gain.comparable) return null;
  const isLoss = gain.meanGainCfm < 0;
  return (
    <span>
      <b className="num n-s">{differenceText(gain.meanGainCfm, locale, 2)}</b> <span className="unit">CFM {gain.side}, mean of the lifts read{isLoss ? ", a loss" : ""}{gain.meanPercent === null ? "" : `, ${decimal(gain.meanPercent, 2, locale)} %`}</span>
      {typeof gain.atCamLift === "string" ? null : <span className="unit">; {differenceText(gain.atCamLift.gainCfm, locale)} at cam lift {liftWords(gain.atCamLift.liftUm, gain.liftUnit, locale)}{gain.atCamLift.gainCfm < 0 ? ", a loss" : ""}</span>}
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
      {[port.intake, port.exhaust].map((g) => { const words = noiseWords(g, locale); return words === null ? null : <p key={g.side} className="hint"><b>{g.side === "intake" ? "Intake" : "Exhaust"}.</b> {words}</p>; })}
      {withheld.length === 0 ? null : <p className="hint">{withheld.join(" ")}</p>}
    </div>
  );
}

/** Every tested port of one head, by cylinder; a head of one port needs no heading. Pure. */
export function FlowCheckHead({ gain, slug, locale }: { gain: GainOfPiece; slug: string; locale: string }) {
  const { headId, ports } = gain;
  if (headId === null || ports.length === 0) return null;
  const at = `/s/${slug}/flow/${headId}`;
  if (ports.length === 1) return ports.map((port) => <FlowCheckPort key={port.cylinder} port={port} locale={locale} />);
  return (
    <div className="grid gap-6">
      {ports.map((port) => (
        <section key={port.cylinder} aria-label={`Port ${port.cylinder}`}>
          <h3 className="mb-2 flex items-baseline justify-between gap-3"><span>Port {port.cylinder}</span> <Link className="lk sm" href={`${at}?port=${port.cylinder}`}>Flow sheet<span className="sr-only">, port {port.cylinder}</span></Link></h3>
          <FlowCheckPort port={port} locale={locale} />
        </section>
      ))}
    </div>
  );
}

/** The bay FLOW CHECK of an order page: every tested port of every head. Renders nothing without a head that was flowed. */
export async function FlowCheck({ ctx, pieceIds }: { ctx: ShopContext; pieceIds: readonly string[] }) {
  const gains: GainOfPiece[] = [];
  for (const id of pieceIds) gains.push(await gainForPiece(ctx, id));
  const { slug, locale, zone } = ctx.shop;
  const reports = await issuedReports(ctx, gains.flatMap((g) => g.headId ?? []));
  return (
    <>
      {gains.filter((g) => g.headId !== null && g.ports.length > 0).map((gain) => {
        const only = gain.ports.length === 1 ? gain.ports[0] : undefined;
        return (
          <Bay
            key={gain.pieceId} label={`Flow check, ${gain.mark}${only && only.cylinder > 1 ? ` port ${only.cylinder}` : ""}`}
            aside={only ? <Link className="lk" href={`/s/${slug}/flow/${gain.headId}${only.cylinder > 1 ? `?port=${only.cylinder}` : ""}`}>Flow sheet</Link> : `${gain.ports.length} ports`}
          >
            <FlowCheckHead gain={gain} slug={slug} locale={locale} />
            <IssuedReports className="mt-3" reports={reports.filter((r) => r.headId === gain.headId)} slug={slug} locale={locale} zone={zone} />
          </Bay>
        );
      })}
    </>
  );
}
