import { ableTo } from "@/modules/access/context";
import { orNotFound, shopPage } from "@/modules/access/page";
import { longDay } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { EnterTimeDialog } from "@/modules/time/components/time-dialog";
import { LookAt } from "@/modules/time/components/look-at";
import { NowTable } from "@/modules/time/components/now-table";
import { WeekView } from "@/modules/time/components/week-view";
import { weekInput } from "@/modules/time/input";
import { peopleAt } from "@/modules/time/queries/people-at";
import { peopleNames } from "@/modules/time/queries/settings-lists";
import { toLookAt } from "@/modules/time/queries/to-look-at";
import { weekSheet } from "@/modules/time/queries/week-sheet";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { PageHead } from "@/modules/ui/page-head";

export const metadata = { title: "Time" };

export default async function TimePage({ params, searchParams }: { params: Promise<{ shop: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const ctx = await shopPage(params, "time.see-own");
  const asked = weekInput.safeParse(await searchParams);
  const ask = asked.success ? asked.data : {};
  const seesAll = ableTo(ctx, "time.see-all");
  const mayEnter = ableTo(ctx, "time.correct");
  const sheet = await orNotFound(weekSheet(ctx, { personId: ask.person, date: ask.date }));
  const [now, look, people] = [await peopleAt(ctx), seesAll ? await toLookAt(ctx) : null, seesAll ? await peopleNames(ctx) : []];
  const today = localDate(ctx.now, ctx.shop.zone);
  const inNow = <Bay label="In now" flush><NowTable initial={now} linksToSheets={seesAll} /></Bay>;
  return (
    <main id="main" className="page">
      <PageHead title="Time" sub={longDay(today, ctx.shop.locale)}
        actions={mayEnter ? <EnterTimeDialog date={today} people={people.filter((p) => ctx.actor.kind !== "person" || p.id !== ctx.actor.id)} trigger={<Button variant="go" icon="plus">Enter time</Button>} /> : undefined} />
      <Bays>
        {look ? <LookAt look={look} mayCorrect={mayEnter} /> : null}
        {seesAll && !ask.person ? inNow : null}
        <WeekView sheet={sheet} people={people} mayEnter={mayEnter} today={today} />
        {seesAll && !ask.person ? null : inNow}
      </Bays>
    </main>
  );
}
