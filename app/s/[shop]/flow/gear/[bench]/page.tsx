import { orNotFound, shopPage } from "@/modules/access/page";
import { GearCheckForm } from "@/modules/flow/components/gear-check-form";
import { GearFactorChart } from "@/modules/flow/components/gear-factor-chart";
import { GearStrikeDialog } from "@/modules/flow/components/gear-strike-dialog";
import { BENCH_SCALE_SHORT } from "@/modules/flow/components/gear-words";
import { FLOW_FLAGS } from "@/modules/flow/domain/flow-flags";
import { benchHistory } from "@/modules/flow/queries/gear";
import { date, dateTime, decimal } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Flag } from "@/modules/ui/flag";
import { Kv } from "@/modules/ui/kv";
import { Note } from "@/modules/ui/note";
import { PageHead } from "@/modules/ui/page-head";
import { Lane } from "@/modules/ui/lane";

export const metadata = { title: "Bench" };

const words = (flag: string): string => FLOW_FLAGS[flag as keyof typeof FLOW_FLAGS] ?? flag;

export default async function BenchPage({ params }: { params: Promise<{ shop: string; bench: string }> }) {
  const ctx = await shopPage(params, "flow.see");
  const { bench, checks, plates, tests, benchCheckHours, canRecord, canSetUp } = await orNotFound(benchHistory(ctx, (await params).bench));
  const { locale, slug } = ctx.shop;
  const n = (v: number, digits: number) => decimal(v, digits, locale);
  const day = (iso: string) => date(localDate(new Date(iso), ctx.shop.zone), locale);
  const latest = bench.check;
  const standing = checks.filter((c) => c.struck === null).length;
  return (
    <main id="main" className="page">
      <PageHead title={bench.name} sub={`${BENCH_SCALE_SHORT[bench.scale]}, ${tests} test${tests === 1 ? "" : "s"} read on it`}
        actions={<><LinkButton href={`/s/${slug}/flow/gear`}>All gear</LinkButton>{canSetUp ? <LinkButton icon="edit" href={`/s/${slug}/flow/gear?view=benches&edit=${bench.id}`}>Change</LinkButton> : null}</>} />
      {latest === null ? <Note className="mb-6" title="Never checked.">Tests read on it stand without a bench check, and nothing may be compared.</Note>
        : latest.isOld ? <Note className="mb-6" title={`Last check ${dateTime(latest.at, ctx.shop)}.`}>It holds {benchCheckHours} h. Tests read now rely on an old check and say so.</Note> : null}
      <div className="split" style={{ "--side": "420px" } as React.CSSProperties}>
        <Bays>
          {standing === 0 ? null : (
            <Bay label="Bench factor" aside={`${standing} check${standing === 1 ? "" : "s"}`}>
              <GearFactorChart locale={locale} dateText={day} points={checks.filter((c) => c.struck === null).reverse().map((c) => ({ at: c.at, factor: c.factor, drifted: c.flags.includes("CALIBRATION_DRIFT") }))} />
            </Bay>
          )}
          <Bay label="Checks" flush>
            {checks.length === 0 ? <p className="mid p-4">No check is on record.</p> : (
              <Lane label="Checks"><table className="calm">
                <caption className="sr-only">Checks of {bench.name}, newest first</caption>
                <thead><tr><th scope="col">When</th><th scope="col">By</th><th scope="col" className="r">Factor</th><th scope="col" className="r">Moved %</th><th scope="col" className="r">Worst plate %</th><th scope="col">Plates: certified, shown</th></tr></thead>
                <tbody>{checks.map((c) => (
                  <tr key={c.id}>
                    <td className="nw">{dateTime(c.at, ctx.shop)}</td><td>{c.by ?? "—"}</td><td className="r q">{c.struck ? <s>{n(c.factor, 4)}</s> : <b>{n(c.factor, 4)}</b>}</td>
                    <td className="r q">{c.driftPercent === null ? "—" : n(c.driftPercent, 2)}</td><td className="r q">{c.plates.length === 0 ? "—" : n(c.maxResidualPercent, 2)}</td>
                    <td className="sm">
                      {c.plates.length === 0 ? "looked over" : c.plates.map((p) => `${p.serial}: ${n(p.referenceCfm, 1)}, ${p.rangeLabel === null ? p.indicatedText : `${p.indicatedText} on range ${p.rangeLabel} = ${n(p.indicatedCfm, 1)}`}`).join("; ")}{c.note ? ` ${c.note}` : ""} {c.flags.map((f) => <Flag key={f} icon="warn">{words(f)}</Flag>)}
                      {c.reason ? <span className="block">Kept because: {c.reason}</span> : null}
                      {c.struck ? <b className="block">Out of use since {dateTime(c.struck.at, ctx.shop)}{c.struck.by ? `, ${c.struck.by}` : ""}: {c.struck.reason}</b> : canSetUp ? <span className="block noprint"><GearStrikeDialog checkId={c.id} when={dateTime(c.at, ctx.shop)} factorText={n(c.factor, 4)} /></span> : null}
                    </td>
                  </tr>
                ))}</tbody>
              </table></Lane>
            )}
          </Bay>
        </Bays>
        <Bays>
          {canRecord && bench.active ? <Bay label="New check"><GearCheckForm bench={{ id: bench.id, scale: bench.scale, ranges: bench.ranges }} plates={plates} /></Bay> : null}
          <Bay label="As set up">
            <Kv pairs={[
              ["Pressures", `${bench.nominalPressuresInH2O.join(", ")} in H₂O`],
              ["Greatest flow", `${n(bench.maxFlowCfm, 0)} CFM`],
              ...bench.ranges.map((r) => [`Range ${r.label}`, `${n(r.fullScaleCfm, 1)} CFM${r.fullScaleHead === undefined ? "" : ` at ${r.fullScaleHead}`}`] as const),
              ["Pressure held to within", bench.pressureUncertaintyInH2O === null ? "not stated" : `${bench.pressureUncertaintyInH2O} in H₂O`],
              ["Reading to within", bench.readingUncertaintyCfm === null ? "not stated" : `${bench.readingUncertaintyCfm} CFM`],
              ["Height above sea", bench.altitudeM === null ? "not stated" : `${n(bench.altitudeM, 0)} m`],
            ]} />
          </Bay>
          <Note tone="info" title="Noise.">Blower and grinders: wear hearing protection (29 CFR 1910.95). Local law and your safety data sheet come first. Ask a qualified person.</Note>
        </Bays>
      </div>
    </main>
  );
}
