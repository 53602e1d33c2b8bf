import type { ReactNode } from "react";
import { amount, date, dateTimeZone, hours, money } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { Note } from "@/modules/ui/note";
import { Tag } from "@/modules/ui/tag";
import { Tube } from "@/modules/ui/tube";
import type { EstimateSnapshot, SnapshotLine } from "../domain/estimate-snapshot";
import { estimateSums } from "../pdf/estimate-paper";
import type { CustomerView } from "../queries/customer-view";

const STATIONS = 8;

function Lines({ lines, s }: { lines: readonly SnapshotLine[]; s: EstimateSnapshot }) {
  return lines.map((l) => (
    <div className="row-l" key={l.lineNo}>
      <span>{l.description}<small>{[l.bookMinutes > 0 ? `${hours(l.bookMinutes, s.locale)} h` : "", l.qtyMilli === 1000 || l.kind === "note" ? "" : `${milliText(l.qtyMilli)} at ${amount(l.unitPriceMinor, s)}`, l.kind === "part" ? "new" : ""].filter(Boolean).join(", ")}</small></span>
      <b className="q">{l.kind === "note" ? "" : amount(l.amountMinor, s)}</b>
    </div>
  ));
}

function WholeEstimate({ s }: { s: EstimateSnapshot }) {
  const many = s.pieces.length > 1;
  return (
    <>
      {many ? s.pieces.map((p) => {
        const own = s.lines.filter((l) => l.pieceNo === p.pieceNo);
        return own.length === 0 ? null : <div key={p.pieceNo} className="mt-3"><b className="b">{p.family}{p.tag ? `, tag ${p.tag}` : `, head ${p.pieceNo}`}</b><Lines lines={own} s={s} /></div>;
      }) : <Lines lines={s.lines} s={s} />}
      {many ? <Lines lines={s.lines.filter((l) => l.pieceNo === null)} s={s} /> : null}
      {estimateSums(s).filter((x) => !/^(Labor|Parts)\b/.test(x.name)).map((x) => <div className="row-l" key={x.name}><span>{x.name}</span><b className="q">{x.value}</b></div>)}
      <div className="row-l t"><b>Estimate</b><b className="num n-s">{money(s.totals.totalMinor, s)}</b></div>
    </>
  );
}

const photoUrl = (token: string, id: string, thumb = false) => `/l/${token}/file/${id}${thumb ? "?thumb=1" : ""}`;

function Photos({ token, ids, label }: { token: string; ids: readonly string[]; label: string }) {
  if (ids.length === 0) return null;
  return (
    <ul className="mt-3 flex flex-wrap gap-2">
      {ids.map((id, i) => (
        <li key={id}><a className="photo" href={photoUrl(token, id)} aria-label={`${label}, photo ${i + 1}`}>
          {/* eslint-disable-next-line @next/next/no-img-element */}
          <img src={photoUrl(token, id, true)} alt="" loading="lazy" width={104} height={70} />
        </a></li>
      ))}
    </ul>
  );
}

/** Where the customer's heads are, in plain words. */
export function WhereHeadsAre({ view, token }: { view: CustomerView; token: string }) {
  return (
    <section>
      <h2 className="eng ink">{view.pieces.length === 1 ? "Your head" : "Your heads"}</h2>
      {view.pieces.map((p) => (
        <div key={p.pieceNo} className="mt-3 border-b border-line pb-4">
          <div className="flex items-center justify-between gap-3">{p.tag ? <Tag>{p.tag}</Tag> : <b className="b">{p.family}</b>}<span className="mid">{p.tag ? p.family : ""}</span></div>
          <p className="mb-2 mt-2 b">{p.place}</p>
          {p.station === null ? null : <Tube value={p.station + (p.isProved ? 1 : 0.5)} mark={STATIONS} label={`Station ${p.station + 1} of ${STATIONS}`} />}
          <Photos token={token} ids={p.photoIds} label={p.family} />
        </div>
      ))}
      {view.promisedOn && view.pieces.some((p) => p.station !== null && !p.isProved) ? <p className="mt-3">Promised for <b className="b">{date(view.promisedOn, view.snapshot.locale)}</b>.</p> : null}
    </section>
  );
}

/** The estimate behind a link: what we would do, what it costs, and what changed. The form that answers stands beside it. */
export function CustomerEstimate({ view, token, zone, heading, lead, children }: { view: CustomerView; token: string; zone: string; heading: string; lead: string; /** Stands before the lines: where the heads are, once it is agreed. */ children?: ReactNode }) {
  const { snapshot: s } = view;
  return (
    <>
      <h1>{heading}</h1>
      <p className="lead">{lead}</p>
      {view.answer ? <p className="mt-3 mid">{view.answer.name} {view.answer.answer === "approved" ? "said yes" : "said no"} {dateTimeZone(view.answer.at, { locale: s.locale, zone })}.</p> : null}
      {children}
      {s.message ? <p className="mt-6">{s.message}</p> : null}
      {view.findings.length > 0 ? (
        <section>
          <h2 className="eng ink">What we found</h2>
          {view.findings.map((f) => <div key={f.id} className="mt-3"><b className="b" style={{ fontSize: "1.0625rem" }}>{f.position ? `${f.position}: ` : ""}{f.words}</b><Photos token={token} ids={f.photoIds} label="What we found" /></div>)}
        </section>
      ) : null}
      {s.change && view.changes ? (
        <>
          <section>
            <h2 className="eng ink">What is new</h2>
            <Lines lines={view.changes.more} s={s} />
            {view.changes.less.length > 0 ? <><p className="mid mt-3">No longer on it:</p><Lines lines={view.changes.less} s={s} /></> : null}
            <div className="row-l"><span>Agreed before</span><b className="q">{amount(s.change.fromTotalMinor, s)}</b></div>
            <div className="row-l"><span>Change, with tax</span><b className="q">{s.change.changeMinor > 0 ? "+" : ""}{amount(s.change.changeMinor, s)}</b></div>
            <div className="row-l t"><b>New total</b><b className="num n-s">{money(s.totals.totalMinor, s)}</b></div>
          </section>
          <section><details><summary className="lk" style={{ cursor: "pointer" }}>The whole estimate, version {s.version}</summary><WholeEstimate s={s} /></details></section>
        </>
      ) : (
        <section>
          <h2 className="eng ink">Estimate {s.number}, version {s.version}</h2>
          <WholeEstimate s={s} />
        </section>
      )}
      {s.exclusions ? <section><h2 className="eng ink">Not included</h2><p className="mt-2">{s.exclusions}</p></section> : null}
      {view.pdf ? <p className="mt-4"><a className="lk" href={`/l/${token}/paper`}>The paper, to keep</a></p> : null}
      {view.newerVersion ? <div className="mt-4"><Note tone="info" title={`There is a version ${view.newerVersion}.`}>We mailed its link. This one stays here to read.</Note></div> : null}
    </>
  );
}

const lower = (s: string) => `${s.slice(0, 1).toLowerCase()}${s.slice(1)}`;

/** Heading and lead of the page, by how the version stands. */
export function customerWords(view: CustomerView): { heading: string; lead: string } {
  const heads = view.snapshot.pieces.length === 1 ? `Your ${view.snapshot.pieces[0]?.family ?? "head"}` : `Your ${view.snapshot.pieces.length} heads`;
  const are = view.snapshot.pieces.length === 1 ? "is" : "are";
  switch (view.standing) {
    case "open": return view.snapshot.change ? { heading: `We found something on ${lower(heads)}`, lead: "Here is what we would do about it. What you agreed to before goes on meanwhile; nothing of this is started before you say yes." }
      : view.pieces.some((p) => p.station !== null) ? { heading: `${heads} ${are} here and looked at`, lead: "Here is what we would do and what it costs. Work starts when you say yes." } : { heading: `${heads} ${are} priced`, lead: "Here is what we would do and what it costs. Work starts when you say yes." };
    case "approved": return { heading: "You said yes. Thank you", lead: `This is what we agreed for ${lower(heads)}.` };
    case "declined": return { heading: "You said no", lead: "Nothing of this version is started. Call us about what happens next." };
    case "replaced": return { heading: "This version was replaced", lead: "A newer version took its place, so this one can no longer be answered." };
    case "out of date": return { heading: "This offer is out of date", lead: "The price must be confirmed again. Call or write us for a new one." };
    case "closed": return { heading: "This order is closed", lead: "It can no longer be answered. Call us if you think it should be." };
  }
}
