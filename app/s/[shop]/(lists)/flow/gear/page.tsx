import { shopPage } from "@/modules/access/page";
import { BenchForm } from "@/modules/flow/components/gear-bench-form";
import { CamshaftForm, FamilyForm } from "@/modules/flow/components/gear-engine-forms";
import { FixtureForm, LiftDeviceForm, PlateForm } from "@/modules/flow/components/gear-small-forms";
import { GearTable, type GearView } from "@/modules/flow/components/gear-tables";
import { LimitsForm, LimitsTable } from "@/modules/flow/components/limits-form";
import { gearRoom, type GearRoom } from "@/modules/flow/queries/gear";
import { dateTime } from "@/modules/kernel/format";
import { LinkButton } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { PageHead } from "@/modules/ui/page-head";
import { Views } from "@/modules/ui/views";

export const metadata = { title: "Bench gear" };

const VIEWS: readonly { key: GearView; label: string; add: string; how: string }[] = [
  { key: "benches", label: "Benches", add: "New bench", how: "A test names the bench it was read on. Add the first one." },
  { key: "plates", label: "Check plates", add: "New plate", how: "Plates of known flow give the bench its factor." },
  { key: "fixtures", label: "Bore adapters", add: "New bore adapter", how: "The sleeve that stands in for the cylinder, by its bore." },
  { key: "lift", label: "Lift devices", add: "New device", how: "What opens the valve, and how finely its indicator reads." },
  { key: "camshafts", label: "Camshafts", add: "New camshaft", how: "A table of angle and lift, or lift and duration." },
  { key: "families", label: "Families", add: "New family", how: "Bore, stroke, valves and cam lifts, as this shop names the engine." },
];

function Form({ view, edit, room }: { view: GearView; edit: string; room: GearRoom }) {
  const find = <T extends { id: string }>(list: readonly T[]) => list.find((x) => x.id === edit) ?? null;
  switch (view) {
    case "benches": return <BenchForm key={edit} bench={find(room.benches)} />;
    case "plates": return <PlateForm key={edit} plate={find(room.plates)} />;
    case "fixtures": return <FixtureForm key={edit} fixture={find(room.fixtures)} />;
    case "lift": return <LiftDeviceForm key={edit} device={find(room.liftDevices)} />;
    case "camshafts": return <CamshaftForm key={edit} cam={find(room.camshafts)} />;
    case "families": return <FamilyForm key={edit} family={find(room.families)} />;
  }
}

export default async function GearPage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "flow.see");
  const asked = await searchParams;
  const room = await gearRoom(ctx);
  const { slug, locale } = ctx.shop;
  const { limits } = room;
  const isLimits = asked.view === "limits";
  const view = VIEWS.find((v) => v.key === asked.view) ?? { key: "benches" as const, label: "Benches", add: "New bench", how: "" };
  const edit = room.canSetUp && typeof asked.edit === "string" ? asked.edit : null;
  const counts: Record<GearView, number> = { benches: room.benches.length, plates: room.plates.length, fixtures: room.fixtures.length, lift: room.liftDevices.length, camshafts: room.camshafts.length, families: room.families.length };
  const href = (key: GearView | "limits") => `/s/${slug}/flow/gear?view=${key}`;
  const add = room.canSetUp && !isLimits ? <LinkButton variant={edit ? "plain" : "go"} icon="plus" href={`${href(view.key)}&edit=new`}>{view.add}</LinkButton> : undefined;
  return (
    <main id="main" className="page">
      <PageHead title="Bench gear" sub={`What the flow room reads with. A bench check holds ${room.benchCheckHours} h.`} close
        actions={<><LinkButton href={`/s/${slug}/flow`}>Flow room</LinkButton><LinkButton href={`/s/${slug}/flow/library`}>Library</LinkButton>{add}</>} />
      <Views label="Kinds of gear" current={isLimits ? "limits" : view.key} views={[...VIEWS.map((v) => ({ key: v.key, label: v.label, href: href(v.key), count: counts[v.key] })), { key: "limits", label: "Limits", href: href("limits") }]} />
      {isLimits ? <div className="mt-4">{limits.maySet ? <LimitsForm key={limits.version} own={limits.own} version={limits.version} /> : <LimitsTable own={limits.own} locale={locale} />}</div> : (
        <div className={edit ? "split mt-4" : "mt-4"} style={edit ? ({ "--side": "480px" } as React.CSSProperties) : undefined}>
          {counts[view.key] === 0 ? <EmptyState title={`No ${view.label.toLowerCase()} yet`} action={edit ? undefined : add}>{view.how}</EmptyState>
            : <GearTable view={view.key} room={room} slug={slug} locale={locale} edit={edit} when={(iso) => dateTime(iso, ctx.shop)} />}
          {edit ? <Form view={view.key} edit={edit} room={room} /> : null}
        </div>
      )}
    </main>
  );
}
