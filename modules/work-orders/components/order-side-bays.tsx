import { dateTime, shortDate, time } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay } from "@/modules/ui/bay";
import type { PlaceFacts } from "@/modules/ui/place";
import { Status } from "@/modules/ui/status";
import type { OrderPage } from "../queries/order-page";

/** Entries shown before the rest folds away. */
const SHOWN = 12;

/** What happened, newest first. What still goes on stands on top. */
export function TimelineBay({ order, place }: { order: OrderPage; place: PlaceFacts }) {
  const day = (iso: string) => {
    const on = localDate(new Date(iso), place.zone);
    return on === order.today ? `Today ${time(iso, place)}` : shortDate(on, place.locale).replace(/^\S+ /, "");
  };
  const item = (t: OrderPage["timeline"][number], i: number) => (
    <li key={`${t.at}${i}`} className={t.isNow ? "now" : undefined}>
      <time dateTime={t.at} title={dateTime(t.at, place)}>{day(t.at)}</time>
      <p>{t.who ? <b className="b">{t.who} </b> : null}{t.words}</p>
    </li>
  );
  const rest = order.timeline.slice(SHOWN);
  return (
    <Bay label="Timeline">
      <ol className="tl">{order.timeline.slice(0, SHOWN).map(item)}</ol>
      {rest.length === 0 ? null : (
        <details className="mt-3">
          <summary className="lk" style={{ cursor: "pointer" }}>{rest.length} earlier</summary>
          <ol className="tl mt-3">{rest.map(item)}</ol>
        </details>
      )}
    </Bay>
  );
}

const MAIL_DIAL = { queued: "wait", sent: "out", failed: "late" } as const;

/** Letters sent about the order, with what became of them. */
export function MailsBay({ order, place }: { order: OrderPage; place: PlaceFacts }) {
  if (order.mails.length === 0) return null;
  return (
    <Bay label="Mails">
      <ul>
        {order.mails.slice(0, 12).map((m, i) => (
          <li key={m.id} className={i === 0 ? undefined : "mt-2 border-t border-line pt-2"}>
            <span className="flex flex-wrap items-baseline justify-between gap-x-3"><b className="b">{m.subject}</b><Status dial={MAIL_DIAL[m.state as keyof typeof MAIL_DIAL] ?? "queue"}>{m.state === "queued" ? "Going out" : m.state === "sent" ? "Sent" : "Came back"}</Status></span>
            <span className="sm mid">{m.to}, {dateTime(m.sentAt ?? m.at, place)}{m.error ? `. ${m.error}` : ""}</span>
          </li>
        ))}
      </ul>
    </Bay>
  );
}

/** Days promised so far, with their reasons, once there was more than one. */
export function PromisesBay({ order, place }: { order: OrderPage; place: PlaceFacts }) {
  if (order.promises.length < 2) return null;
  return (
    <Bay label="Promises">
      <ol className="tl">{order.promises.map((p, i) => <li key={p.at} className={i === 0 ? "now" : undefined}><time dateTime={p.promisedOn}>{shortDate(p.promisedOn, place.locale)}</time><p>{p.reason} <span className="dim">{p.by}</span></p></li>)}</ol>
    </Bay>
  );
}
