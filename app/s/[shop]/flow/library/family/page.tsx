import Link from "next/link";
import { orNotFound, shopPage } from "@/modules/access/page";
import { differenceText } from "@/modules/flow/components/flow-words";
import { LibraryCurves, type NamedCurve } from "@/modules/flow/components/library-curves";
import { LibraryGainStrips } from "@/modules/flow/components/library-gain-strips";
import { portWords } from "@/modules/flow/components/library-words";
import { UnitSwitch } from "@/modules/flow/components/unit-switch";
import { unitsAsked, unitViews, unitWords } from "@/modules/flow/components/unit-words";
import { familyNames } from "@/modules/flow/queries/library";
import { familyPicture, MEDIAN_OF_NEWEST, type FamilyPicture } from "@/modules/flow/queries/library-family";
import { date, decimal } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay, Bays } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";
import { Views } from "@/modules/ui/views";
import { Lane } from "@/modules/ui/lane";

export const metadata = { title: "What a family did" };
const LAST = 10;

function curvesOf(p: FamilyPicture): NamedCurve[] {
  const curves: NamedCurve[] = [
    { name: `Middle before (${Math.max(0, ...p.before.map((m) => m.n))})`, look: "thin", readings: p.before },
    { name: `Middle after (${Math.max(0, ...p.after.map((m) => m.n))})`, look: "thick", readings: p.after },
    ...(p.best ? [{ name: `Best: ${p.best.mark}`, look: "dash" as const, readings: p.best.readings }] : []),
  ];
  return curves.filter((c) => c.readings.length > 0);
}

export default async function FamilyPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const asked = await searchParams;
  const families = (await familyNames(ctx)).filter((f) => f.heads > 0);
  const { slug, locale } = ctx.shop;
  const base = `/s/${slug}/flow/library`;
  const family = typeof asked.family === "string" ? asked.family : families.reduce<(typeof families)[number] | undefined>((most, f) => (most && most.heads >= f.heads ? most : f), undefined)?.name;
  const side = asked.side === "exhaust" ? "exhaust" as const : "intake" as const;
  if (family === undefined) return <main id="main" className="page"><PageHead title="What a family did" /><EmptyState title="No heads yet">Families fill as heads are flowed.</EmptyState></main>;
  const p = await orNotFound(familyPicture(ctx, { family, side, last: LAST }));
  const views = unitViews(p.liftUnit, (u) => `${base}/family?family=${encodeURIComponent(family)}&side=${side}${u === "read" ? "" : `&units=${u}`}`);
  const units = views.find((v) => v.key === unitsAsked(asked.units))?.key ?? "read";
  const w = unitWords(units, p.liftUnit, locale);
  const href = (f: string, s: string) => `${base}/family?family=${encodeURIComponent(f)}&side=${s}${units === "read" ? "" : `&units=${units}`}`;
  const day = (iso: string) => date(localDate(new Date(iso), ctx.shop.zone), locale);
  const facts = [p.bore === null ? null : `${decimal(p.bore, 1, locale)} × ${p.stroke === null ? "?" : decimal(p.stroke, 1, locale)} mm`, p.valves ? `${side} ${p.valves}` : null, `${p.tests} test${p.tests === 1 ? "" : "s"} of ${p.heads} flowed head${p.heads === 1 ? "" : "s"}`].filter(Boolean).join(", ");
  const unitOf = p.liftUnit;
  const strips = { gains: p.gains.map((g) => ({ ...g, medianCfm: g.medianCfm * w.perCfm, dots: g.dots.map((d) => ({ ...d, gainCfm: d.gainCfm * w.perCfm })) })), unit: w.liftUnit, flowUnit: w.flowUnit, locale, names: `the last heads of ${family}, ${side}` };
  return (
    <main id="main" className="page">
      <PageHead title={family} sub={facts} close actions={<><LinkButton href={`${base}?family=${encodeURIComponent(family)}&side=${side}`}>Its tests</LinkButton><LinkButton href={base}>Library</LinkButton></>} />
      <Views label="Side" current={side} views={(["intake", "exhaust"] as const).map((s) => ({ key: s, label: s === "intake" ? "Intake" : "Exhaust", href: href(family, s) }))} />
      <nav aria-label="Families" className="bar">{families.map((f) => <Link key={f.name} className={f.name === family ? "b" : "lk"} aria-current={f.name === family ? "page" : undefined} href={href(f.name, side)}>{f.name} <span className="dim sm">{f.heads} head{f.heads === 1 ? "" : "s"}</span></Link>)}</nav>
      <UnitSwitch current={units} choices={views} />
      <div className="two mt-6">
        <Bay label={`Gains of the last ${LAST} heads`}>
          <div className="hide-s"><LibraryGainStrips {...strips} /></div>
          <div className="only-phone"><LibraryGainStrips {...strips} width={340} /></div>
          {p.gains.length === 0 ? null : <p className="hint">Only ports whose before and after may be compared. Bars are the middle of the ports; greyed with fewer than three. Open dots left of zero are losses, ▼ counts them.</p>}
        </Bay>
        <Bay label="Middle and best curve">
          <div className="hide-s"><LibraryCurves curves={curvesOf(p)} unit={unitOf} atInH2O={p.atInH2O} camLiftUm={p.camLiftUm} locale={locale} title={`${family}, ${side}`} units={units} /></div>
          <div className="only-phone"><LibraryCurves curves={curvesOf(p)} unit={unitOf} atInH2O={p.atInH2O} camLiftUm={p.camLiftUm} locale={locale} title={`${family}, ${side}`} units={units} width={340} height={260} /></div>
          <p className="hint">
            Middle flow at each lift over the newest {MEDIAN_OF_NEWEST} tests of each kind at {w.pressure(p.atInH2O)}; the number of tests stands behind the name.
            {p.best ? ` Best is the highest mean flow up to cam lift: ${w.flow(p.best.meanToCamCfm)} ${w.flowUnit}, ${p.best.mark}, ${day(p.best.startedAt)}.` : " No test here reaches a recorded cam lift, so none is called best."}
            {p.otherPressure > 0 ? ` ${p.otherPressure} test${p.otherPressure === 1 ? "" : "s"} at another pressure left out.` : ""}
          </p>
        </Bay>
      </div>
      <Bays className="mt-7">
        <Bay label="These heads" flush>
          {p.ports.length === 0 ? <p className="mid p-4">No head of this family was flowed after work yet.</p> : (
            <Lane label="These heads"><table className="calm">
              <caption className="sr-only">Ports of the last heads flowed after work, newest first</caption>
              <thead><tr><th scope="col">Head</th><th scope="col">Port</th><th scope="col">Work done</th><th scope="col" className="r">Mean change, {w.flowUnit}</th><th scope="col" className="r">%</th><th scope="col">What stands beside it</th><th scope="col" className="r">Flowed</th></tr></thead>
              <tbody>{p.ports.map((x) => (
                <tr key={`${x.headId}${x.cylinder}`}>
                  <td><Link className="lk ord nw" href={`/s/${slug}/flow/${x.headId}`}>{x.mark}</Link>{x.ownerKind === "development" ? <span className="dim sm"> own</span> : null}</td>
                  <td>{portWords(x.cylinder, side)}</td><td className="sm">{x.workDone.join(", ") || "—"}</td>
                  <td className="r q"><b>{x.meanGainCfm === null ? "withheld" : w.difference(x.meanGainCfm)}</b></td><td className="r q">{x.meanPercent === null ? "" : differenceText(x.meanPercent, locale)}</td>
                  <td className="sm">{x.gain === "absent" ? "No before test." : [...x.reasons, ...x.notes].join(" ") || "—"}</td><td className="r nw">{day(x.flowedAt)}</td>
                </tr>
              ))}</tbody>
            </table></Lane>
          )}
        </Bay>
        {p.gains.length === 0 ? null : <Bay label="Gains as figures" flush>
          <Lane label="Gains as figures"><table className="calm">
            <caption className="sr-only">Gain at each lift, {w.flowUnit}: middle, least and most</caption>
            <thead><tr><th scope="col">Lift, {w.liftUnit}</th><th scope="col" className="r">Ports</th><th scope="col" className="r">Least</th><th scope="col" className="r">Middle</th><th scope="col" className="r">Most</th><th scope="col" className="r">Lost flow</th></tr></thead>
            <tbody>{p.gains.map((g) => <tr key={g.liftUm} className={g.isThin ? "dim" : undefined}><th scope="row">{w.lift(g.liftUm)}</th><td className="r q">{g.n}</td><td className="r q">{w.difference(g.dots.at(-1)?.gainCfm ?? 0)}</td><td className="r q"><b>{w.difference(g.medianCfm)}</b></td><td className="r q">{w.difference(g.dots[0]?.gainCfm ?? 0)}</td><td className="r q">{g.losses === 0 ? "none" : g.losses}</td></tr>)}</tbody>
          </table></Lane>
        </Bay>}
      </Bays>
    </main>
  );
}
