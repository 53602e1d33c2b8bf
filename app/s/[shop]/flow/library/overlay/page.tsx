import Link from "next/link";
import { notFound } from "next/navigation";
import { orNotFound, shopPage } from "@/modules/access/page";
import { MeansTable } from "@/modules/flow/components/comparison-figures";
import { camWords, crossoverWords, noCamWords } from "@/modules/flow/components/comparison-words";
import { LibraryCurves } from "@/modules/flow/components/library-curves";
import { bandHint, NoiseVerdicts } from "@/modules/flow/components/noise-verdicts";
import { UnitSwitch } from "@/modules/flow/components/unit-switch";
import { unitsAsked, unitViews, unitWords } from "@/modules/flow/components/unit-words";
import { portWords, PURPOSE_WORDS } from "@/modules/flow/components/library-words";
import { marginsOf } from "@/modules/flow/domain/noise-band";
import type { Purpose } from "@/modules/flow/domain/raw-test";
import { overlayInput } from "@/modules/flow/library-input";
import { overlayOf, type OverlaySide } from "@/modules/flow/queries/library-family";
import { date, decimal } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay } from "@/modules/ui/bay";
import { LinkButton } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Two tests over each other" };

const nameOf = (s: OverlaySide) => `${s.mark} ${portWords(s.cylinder, s.side)} ${PURPOSE_WORDS[s.purpose as Purpose]}`;

export default async function OverlayPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const { a, b, units: askedUnits } = await searchParams;
  const ask = overlayInput.safeParse({ a, b });
  if (!ask.success) notFound();
  const over = await orNotFound(overlayOf(ctx, ask.data));
  const { slug, locale } = ctx.shop;
  const views = unitViews(over.b.liftUnit, (u) => `/s/${slug}/flow/library/overlay?a=${ask.data.a}&b=${ask.data.b}${u === "read" ? "" : `&units=${u}`}`);
  const units = views.find((v) => v.key === unitsAsked(askedUnits))?.key ?? "read";
  const w = unitWords(units, over.b.liftUnit, locale);
  const unit = over.b.liftUnit;
  const day = (iso: string) => date(localDate(new Date(iso), ctx.shop.zone), locale);
  const margins = over.comparable ? marginsOf(over.noise?.rows ?? []) : [];
  const hint = over.comparable ? bandHint(over.noise, "the first", "the second") : null;
  const word = over.samePort ? "Gain" : "Difference";
  return (
    <main id="main" className="page">
      <PageHead title={`${nameOf(over.a)} and ${nameOf(over.b)}`} sub={over.a.family === over.b.family ? over.a.family : `${over.a.family} and ${over.b.family}`} actions={<LinkButton href={`/s/${slug}/flow/library`}>Library</LinkButton>} />
      {over.comparable
        ? <Note tone="info" className="mb-6" title="May be compared.">Side, bench, bore adapter, pressure, entry, open valves and lifts are alike.{over.samePort ? "" : " They are two castings, so the difference is not the gain of one port."} {over.notes.map((n) => n.words).join(" ")}</Note>
        : <Note className="mb-6" title="Not comparable, so no difference is shown.">{over.reasons.map((r) => r.words).join(" ")} {over.notes.map((n) => n.words).join(" ")}</Note>}
      <UnitSwitch current={units} choices={views} />
      <div className="split" style={{ "--side": "460px" } as React.CSSProperties}>
        <Bay label="Over each other">
          <div className="hide-s"><LibraryCurves curves={[{ name: nameOf(over.a), look: "thin", readings: over.a.readings }, { name: nameOf(over.b), look: "thick", readings: over.b.readings }]} unit={unit} atInH2O={over.b.atInH2O} camLiftUm={over.camLiftUm} locale={locale} title="Two tests over each other" margins={margins} units={units} width={820} height={420} /></div>
          <div className="only-phone"><LibraryCurves curves={[{ name: "First", look: "thin", readings: over.a.readings }, { name: "Second", look: "thick", readings: over.b.readings }]} unit={unit} atInH2O={over.b.atInH2O} camLiftUm={over.camLiftUm} locale={locale} title="Two tests over each other" margins={margins} units={units} width={340} height={280} /></div>
          {hint === null ? null : <p className="hint">{hint}</p>}
          {over.a.atInH2O === over.b.atInH2O ? null : <p className="hint">The first is stated at {w.pressure(over.a.atInH2O)}, the second at {w.pressure(over.b.atInH2O)}: the two lines do not stand on one scale of pressure.</p>}
        </Bay>
        <Bay label={`Readings, ${w.flowUnit}`} flush>
          <table className="calm">
            <caption className="sr-only">Both tests lift by lift</caption>
            <thead><tr><th scope="col">Lift, {w.liftUnit}</th><th scope="col" className="r">First</th><th scope="col" className="r">Second</th>{over.comparable ? <th scope="col" className="r">{word}</th> : null}</tr></thead>
            <tbody>{over.rows.map((r) => <tr key={r.liftUm}><th scope="row">{w.lift(r.liftUm)}</th><td className="r q">{r.a === null ? "—" : w.flow(r.a)}</td><td className="r q">{r.b === null ? "—" : w.flow(r.b)}</td>{over.comparable ? <td className="r q"><b>{r.difference === null ? "—" : w.difference(r.difference)}</b></td> : null}</tr>)}</tbody>
            {over.meanDifferenceCfm === null ? null : <tfoot><tr><td colSpan={3}>Mean of the common lifts</td><td className="r q">{w.difference(over.meanDifferenceCfm)}</td></tr></tfoot>}
          </table>
          {over.compared === null ? null : (
            <>
              <MeansTable gain={over.compared.gain} means={over.compared.means} w={w} caption="What the two tests come to" heads={["First", "Second", word]} />
              <p className="hint p-3">{[camWords(over.compared.means, (v) => decimal(v, 0, locale)), noCamWords(over.compared.means), crossoverWords(over.compared.gain, w, over.samePort) ?? "The two do not cross."].filter((x) => x !== null).join(" ")}</p>
            </>
          )}
          {over.noise === null ? null : <NoiseVerdicts port={{ noise: over.noise.rows, withheld: [], history: over.noise.history, notStated: over.noise.notStated, liftUnit: unit }} locale={locale} units={units} />}
          <div className="p-4">
            {[over.a, over.b].map((s, i) => <p key={s.testId} className="sm mid mb-2"><b>{i === 0 ? "First" : "Second"}: <Link className="lk" href={`/s/${slug}/flow/${s.headId}`}>{s.mark}</Link></b>, {day(s.startedAt)}, {s.operator}. {s.conditions.join(", ")}.</p>)}
          </div>
        </Bay>
      </div>
    </main>
  );
}
