"use client";

import clsx from "clsx";
import { hours, money, shortDate, time } from "@/modules/kernel/format";
import { addDays } from "@/modules/kernel/instant";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { Flag } from "@/modules/ui/flag";
import { usePlace } from "@/modules/ui/place";
import { TextLink } from "@/modules/ui/text-link";
import { Tube } from "@/modules/ui/tube";
import type { SheetDay, SheetEntry, WeekSheet } from "../queries/week-sheet";
import { capital, spell } from "../tablet/words";
import { AskCorrectionDialog, EnterTimeDialog, SetAsideDialog } from "./time-dialog";

const WEEK = 40 * 60;

/** One person's week: each day attendance beside bench, with what is not explained; every row with its source. */
export function WeekView({ sheet, people, mayEnter, today }: { today: string; sheet: WeekSheet; people: readonly { id: string; name: string }[]; mayEnter: boolean }) {
  const place = usePlace();
  const at = (date: string) => `/s/${place.slug}/time?${sheet.isOwn ? "" : `person=${sheet.personId}&`}date=${date}`;
  const correct = (entry: SheetEntry | undefined, date: string, label: string) =>
    sheet.isOwn ? <AskCorrectionDialog entry={entry} date={date} trigger={<Button size="sm" variant="lo">{label}</Button>} />
    : mayEnter ? <EnterTimeDialog entry={entry} date={date} personId={sheet.personId} people={people} trigger={<Button size="sm" variant="lo">{label}</Button>} /> : null;
  return (
    <Bay label={`${sheet.isOwn ? "My week" : sheet.name}, from ${shortDate(sheet.from, place.locale)}`} flush
      aside={<span className="inline-flex gap-4"><TextLink href={at(addDays(sheet.from, -7))}>Before</TextLink><TextLink href={at(addDays(sheet.from, 7))}>After</TextLink></span>}>
      <div className="mb-3 flex flex-wrap items-center gap-x-8 gap-y-3 px-[18px] pt-1">
        <span className="num n-l">{spell(sheet.doorMinutes)}</span>
        <span className="min-w-[220px] flex-1"><Tube value={sheet.doorMinutes} mark={WEEK} size="big" label={`${hours(sheet.doorMinutes, place.locale, 2)} of 40 hours`} /><span className="mid sm mt-1 block">{hours(sheet.doorMinutes, place.locale, 2)} h at the door, {hours(sheet.benchMinutes, place.locale, 2)} h on the bench clock</span></span>
        {sheet.overtimeMinutes > 0 ? <Flag>Over 40 h by {spell(sheet.overtimeMinutes)}</Flag> : null}
        {sheet.pay ? <span className="mid sm">Pay by this sheet, an estimate: <b className="q">{money(sheet.pay.totalMinor, place)}</b>{sheet.pay.premiumMinor > 0 ? <>, of it {money(sheet.pay.premiumMinor, place)} premium</> : null}. Payroll decides.</span> : null}
      </div>
      <table>
        <caption className="sr-only">Days of the week</caption>
        <thead><tr><th scope="col">Day and time</th><th scope="col">What</th><th scope="col" className="r">Time</th><th scope="col" className="w2">From</th><th scope="col"><span className="sr-only">Correct</span></th></tr></thead>
        {sheet.days.map((d) => (
          <tbody key={d.date}>
            <tr className="calm">
              <td className="b nw">{shortDate(d.date, place.locale)}</td>
              <td>{d.doorMinutes === 0 && d.entries.length === 0 ? <span className="mid">{d.date > today ? "" : "Off"}</span> : <span className="mid">{partsOf(d)} {d.asks === "none" ? null : <Flag tone="open">{d.asks === "what was done" ? `${spell(d.unexplainedMinutes)} not explained` : `bench ${spell(-d.unexplainedMinutes)} beyond door`}</Flag>}</span>}</td>
              <td className="r q nw"><b>{d.doorMinutes > 0 ? spell(d.doorMinutes) : ""}</b></td>
              <td className="w2" />
              <td className="r">{d.date > today ? null : correct(undefined, d.date, sheet.isOwn ? "Missing time" : "Enter")}</td>
            </tr>
            {d.entries.map((e) => (
              <tr key={e.id} className={clsx(e.isReplaced && "dim")}>
                <td className="q nw pl-4">{e.isReplaced ? <s>{spanOf(e, place)}</s> : spanOf(e, place)}</td>
                <td>{capital(e.words)}{e.isRework ? <> <Flag tone="open">Rework</Flag></> : null}{e.isReplaced ? <span className="mid"> · corrected</span> : null}{e.reason ? <span className="mid block">{e.reason}</span> : null}</td>
                <td className="r q nw">{e.isReplaced ? <s>{spell(e.minutes)}</s> : spell(e.minutes)}</td>
                <td className="w2 mid">{SOURCE[e.source] ?? e.source}</td>
                <td className="r">{e.isReplaced ? null : correct(e, d.date, "Correct")}{e.isReplaced || sheet.isOwn || !mayEnter || e.endedAt === null ? null : <SetAsideDialog entry={e} trigger={<Button size="sm" variant="lo">Take out</Button>} />}</td>
              </tr>
            ))}
          </tbody>
        ))}
      </table>
    </Bay>
  );
}

const partsOf = (d: SheetDay): string =>
  [["bench", d.directMinutes], ["not on a head", d.indirectMinutes], ["breaks", d.paidBreakMinutes]].filter(([, m]) => Number(m) > 0).map(([w, m]) => `${w} ${spell(Number(m))}`).join(", ");
const spanOf = (e: SheetEntry, place: { locale: string; zone: string }) => `${time(e.startedAt, place)} to ${e.endedAt ? time(e.endedAt, place) : "now"}`;
const SOURCE: Record<string, string> = { tablet: "Tablet", offline: "Tablet, kept", desk: "Desk", manager: "Entered", correction: "Correction" };
