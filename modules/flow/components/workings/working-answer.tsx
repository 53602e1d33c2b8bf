import { Icon } from "@/modules/ui/icon";
import { Lane } from "@/modules/ui/lane";
import { Note } from "@/modules/ui/note";
import { entryText, figureText } from "../../workings/answer-text";
import { flagWords } from "../../workings/flag-words";
import type { Answer, Cell, Output } from "../../workings/output";
import type { Typed, Worked } from "../../workings/typed-inputs";
import type { Working } from "../../workings/working";

type Rows = readonly Readonly<Record<string, Cell>>[];
const headed = (o: Output) => <>{o.label}{o.unit ? <span className="normal-case tracking-normal">, {o.unit}</span> : null}</>;

/** Lists of one length stand side by side, headed by the input they go along with. */
function Columns({ columns, answer, typed, locale, title }: { columns: readonly Output[]; answer: Answer; typed: Typed; locale: string; title: string }) {
  const lists = columns.map((o) => answer.values[o.key] as readonly (number | null)[]);
  const length = Math.max(0, ...lists.map((l) => l.length));
  const along = columns.flatMap((o) => o.along ?? []).find((key) => (typed[key] ?? "").trim() !== "");
  const heads = along === undefined ? null : (typed[along] ?? "").trim().split(/[\s;]+/);
  return (
    <Lane label={title}><table className="calm mb-3">
      <caption className="sr-only">{title}</caption>
      <thead><tr>{heads ? <th scope="col">{along?.startsWith("at") ? "At" : "Lift"}</th> : null}{columns.map((o) => <th key={o.key} scope="col" className="r">{headed(o)}</th>)}</tr></thead>
      <tbody>{Array.from({ length }, (_, i) => (
        <tr key={i}>{heads ? <th scope="row" className="border-b border-line align-middle normal-case tracking-normal text-ink">{heads[i] ?? ""}</th> : null}
          {columns.map((o, c) => { const v = lists[c]?.[i] ?? null; return <td key={o.key} className="r q">{typeof v === "number" && v < 0 ? <b><span aria-hidden>▼ </span>{entryText(o, v, locale)}</b> : entryText(o, v, locale)}</td>; })}</tr>
      ))}</tbody>
    </table></Lane>
  );
}

function Records({ output, rows, locale }: { output: Output; rows: Rows; locale: string }) {
  if (rows.length === 0) return <p className="mb-3">{output.label}: none.</p>;
  const columns = output.columns ?? [];
  return (
    <table className="calm mb-3">
      <caption className="sr-only">{output.label}</caption>
      <thead><tr>{columns.map((o) => <th key={o.key} scope="col" className={o.kind === "number" ? "r" : undefined}>{headed(o)}</th>)}</tr></thead>
      <tbody>{rows.map((r, i) => <tr key={i}>{columns.map((o) => <td key={o.key} className={o.kind === "number" ? "r q" : undefined}>{entryText(o, r[o.key] ?? null, locale)}</td>)}</tr>)}</tbody>
    </table>
  );
}

/** A figure, a word, or several of them in one line. */
function Entry({ output, value, locale }: { output: Output; value: Answer["values"][string]; locale: string }) {
  const isFigure = typeof value === "number" && output.words === undefined;
  const text = Array.isArray(value) ? (value as readonly (number | string)[]).map((v) => entryText(output, v, locale)).join("; ") || "none" : entryText(output, value as number | string | boolean, locale);
  return (
    <div className="wk-out">
      <dt>{output.label}</dt>
      <dd>{isFigure ? <span className="num n-m">{figureText(output, value, locale)}</span> : <b>{text}</b>}{output.unit && (isFigure || Array.isArray(value)) ? <> <span className="unit normal-case tracking-normal">{output.unit}</span></> : null}</dd>
    </div>
  );
}

function Figures({ working, answer, typed, locale }: { working: Working; answer: Answer; typed: Typed; locale: string }) {
  const given = working.outputs.filter((o) => answer.values[o.key] !== undefined);
  const isList = (o: Output) => o.kind === "numbers" && Array.isArray(answer.values[o.key]);
  const lists = given.filter(isList);
  const asTable = lists.filter((o) => (o.along ?? []).length > 0 || lists.length > 1);
  const records = given.filter((o) => o.kind === "rows");
  const entries = given.filter((o) => !asTable.includes(o) && !records.includes(o));
  return (
    <>
      {entries.length > 0 ? <dl className="mb-3">{entries.map((o) => { const value = answer.values[o.key]; return value === undefined ? null : <Entry key={o.key} output={o} value={value} locale={locale} />; })}</dl> : null}
      {asTable.length > 0 ? <Columns columns={asTable} answer={answer} typed={typed} locale={locale} title={working.title} /> : null}
      {records.map((o) => <Records key={o.key} output={o} rows={answer.values[o.key] as Rows} locale={locale} />)}
      {answer.flags.length > 0 ? <ul className="wk-flags" aria-label="Doubts">{answer.flags.map((f) => <li key={f}><Icon name="warn" size={18} /><span>{flagWords(f)}</span></li>)}</ul> : null}
      {given.length === 0 && answer.flags.length === 0 ? <p>Nothing here deserves a second look.</p> : null}
    </>
  );
}

/** What stands beside the form: what is still to type, a refusal in words, or the figures with their doubts. */
export function WorkingAnswer({ working, worked, typed, locale }: { working: Working; worked: Worked; typed: Typed; locale: string }) {
  switch (worked.state) {
    case "empty": return <p className="mid">Type into the wells, or fill in the example. The answer stands here as you type.</p>;
    case "waiting": return <p className="mid">{worked.words}</p>;
    case "refused": return worked.refusal.code === "ESTIMATES_OFF" ? <Note tone="info">{worked.refusal.message}</Note> : <Note tone="stop" title="No answer.">{worked.refusal.message}</Note>;
    case "answered": return <Figures working={working} answer={worked.answer} typed={typed} locale={locale} />;
  }
}
