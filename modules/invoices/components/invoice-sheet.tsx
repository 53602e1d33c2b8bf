import { curveUnit } from "../domain/curve-unit";
import { GainCurve } from "@/modules/flow/components/gain-curve";
import { amount, date, decimal, money } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { Mark } from "@/modules/ui/mark";
import { printCreditorReference } from "../domain/creditor-reference";
import { readingsOf } from "../domain/gain-block";
import { invoiceSums } from "../domain/invoice-sums";
import type { InvoiceLine, InvoicePiece, InvoiceSnapshot } from "../domain/invoice-snapshot";

const hoursText = (minutes: number, locale: string) => (minutes === 0 ? "" : decimal(minutes / 60, 2, locale));
const signed = (n: number, digits: number, locale: string) => `${n > 0 ? "+" : n < 0 ? "−" : ""}${decimal(Math.abs(n), digits, locale)}`;

function LineTable({ head, rows }: { head: readonly string[]; rows: readonly (readonly string[])[] }) {
  return (
    <table>
      <thead><tr>{head.map((h, i) => <th key={h} scope="col" className={i === 0 ? undefined : "r"}>{h}</th>)}</tr></thead>
      <tbody>
        {rows.map((row, r) => (
          <tr key={r}>{row.map((cell, i) => <td key={i} className={i === 0 ? undefined : i === row.length - 1 ? "r q b" : "r q"}>{cell}</td>)}</tr>
        ))}
      </tbody>
    </table>
  );
}

function GainBox({ piece, locale, withTag }: { piece: InvoicePiece; locale: string; withTag: boolean }) {
  const { gain } = piece;
  const first = Math.min(...gain.sides.map((s) => s.cylinder));
  const sides = gain.sides.filter((s) => s.cylinder === first);
  const at = sides[0]?.atInH2O;
  return (
    <section className="sheet-gain" aria-label={`Measured flow of ${piece.tag}`}>
      <span className="eng">{gain.comparable ? "Measured gain" : "Measured flow"}{withTag ? ` ${piece.tag}` : ""}{at ? `, ${decimal(at, 0, locale)} in H₂O` : ""}</span>
      {sides.length === 0 ? null : (
        <GainCurve
          lines={sides.map((s) => ({ side: s.side, ...readingsOf(s), gain: s.comparison.comparable ? "shown" : "withheld" }))}
          unit={curveUnit(locale)} atInH2O={at ?? 28} camLiftUm={sides[0]?.camLiftUm ?? null} width={390} height={236} locale={locale} mini
        />
      )}
      {gain.comparable ? (
        <div className="sheet-gn">
          {sides.flatMap((s) => (s.comparison.comparable ? [
            <span key={s.side}>
              <span className="num n-s">{signed(s.comparison.meanGainCfm, 2, locale)}</span><br />
              <span className="unit">{s.side} CFM, mean of {s.comparison.rows.length}{s.comparison.meanPercent === null ? "" : `, ${signed(s.comparison.meanPercent, 2, locale)} %`}</span>
            </span>,
          ] : []))}
        </div>
      ) : (
        <p className="sm"><b>No gain is stated.</b> {gain.reasons.join(" ")}</p>
      )}
    </section>
  );
}

/** An invoice as its paper shows it, on the screen: the same snapshot, the same order. */
export function InvoiceSheet({ s }: { s: InvoiceSnapshot }) {
  const p = { locale: s.locale, currency: s.currency };
  const many = s.pieces.length > 1;
  const symbol = s.currency === "USD" ? "$" : s.currency;
  const name = (l: InvoiceLine) => `${many && l.pieceTag ? `${l.pieceTag} ` : ""}${l.description}${l.kind === "labor" && l.qtyMilli !== 1000 ? `, ${milliText(l.qtyMilli)} × ${amount(l.unitPriceMinor, p)}` : ""}`;
  const of = (...kinds: string[]) => s.lines.filter((l) => kinds.includes(l.kind));
  const [labor, parts, other, notes] = [of("labor"), of("part", "core"), of("outside", "discount"), of("note")];
  const [first, ...more] = s.pieces;
  return (
    <article className="sheet" aria-label={s.number ? `Invoice ${s.number}` : "Draft invoice"}>
      <header className="sheet-h">
        <Mark width={34} />
        <div><b>{s.shop.name}</b><br /><span className="dim">{s.shop.address.replaceAll("\n", ", ")} {s.shop.phone}</span></div>
        <div className="text-end"><span className="eng">{s.kind === "credit" ? "Credit note" : "Invoice"}</span><div className="sheet-no num">{s.number ?? "Draft"}</div></div>
      </header>
      <div className="ruler" />
      <div className="sheet-who">
        <div><span className="eng">Bill to</span><b>{s.customer.name}</b><br />{s.customer.address.replaceAll("\n", ", ")}</div>
        <div><span className="eng">Job</span><b>{[...new Set(s.pieces.map((x) => x.family))].join(", ") || s.orderNumber}</b><br />Order {s.orderNumber}{s.pieces.length ? `, ${s.pieces.map((x) => x.tag).join(", ")}` : ""}</div>
        <div><span className="eng">Dated</span><b>{date(s.date, s.locale)}</b><br />supplied {date(s.supplyOn, s.locale)}</div>
        <div className="text-end"><span className="eng">{s.credits ? "For invoice" : "Pay by"}</span><b>{s.credits ? s.credits.number : s.dueOn === s.date ? "On receipt" : date(s.dueOn, s.locale)}</b></div>
      </div>
      {s.credits ? <p className="mb-3">{s.credits.reason}</p> : null}
      {labor.length ? <LineTable head={["Labor", "Book h", "Worked h", symbol]} rows={labor.map((l) => [name(l), hoursText(l.bookMinutes, s.locale), hoursText(l.actualMinutes, s.locale), amount(l.amountMinor, p)])} /> : null}
      {parts.length ? <LineTable head={["Parts", "Count", "Each", symbol]} rows={parts.map((l) => [name(l), milliText(l.qtyMilli), amount(l.unitPriceMinor, p), amount(l.amountMinor, p)])} /> : null}
      {other.length ? <LineTable head={["Other", symbol]} rows={other.map((l) => [name(l), amount(l.amountMinor, p)])} /> : null}
      <div className="sheet-bottom">
        {first ? <GainBox piece={first} locale={s.locale} withTag={many} /> : <div />}
        <section aria-label="Sums">
          <dl className="sheet-sums">
            {invoiceSums(s).map((x) => <div key={x.name} className={x.strong ? "b" : undefined}><dt>{x.name}</dt><dd className="q">{amount(x.minor, p)}</dd></div>)}
            <div className="due"><dt className="b">{s.kind === "credit" ? "Credited" : "To pay"}</dt><dd className="num">{money(s.kind === "credit" ? -s.totals.totalMinor : s.balanceMinor, p)}</dd></div>
          </dl>
          {s.reference ? <p className="sm mid mt-3">Reference <b className="q">{printCreditorReference(s.reference)}</b></p> : null}
        </section>
      </div>
      {more.map((x) => <div key={x.tag} className="mt-6"><GainBox piece={x} locale={s.locale} withTag /></div>)}
      {notes.map((l) => <p key={l.id} className="sm mid mt-3">{l.description}</p>)}
      {s.refused.length ? <div className="mt-4"><span className="eng">Found, and not wanted</span>{s.refused.map((r) => <p key={r.words} className="sm mid">{r.words} Declined {date(r.on, s.locale)}.</p>)}</div> : null}
      {s.approvals.length ? <div className="mt-4"><span className="eng">Agreed</span>{s.approvals.map((a) => <p key={a.version} className="sm mid">Version {a.version}, {money(a.totalMinor, p)}: {a.name}, {date(a.on, s.locale)}.</p>)}</div> : null}
      {s.words ? <p className="sm mid mt-4">{s.words}</p> : null}
    </article>
  );
}
