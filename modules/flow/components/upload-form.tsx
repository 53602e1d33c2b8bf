"use client";

import { useRouter } from "next/navigation";
import { useId, useMemo, useRef, useState } from "react";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { fileRows, guessMapping, type FileMapping } from "../domain/file-rows";
import { decodeText, type TextEncoding } from "../domain/file-text";
import { FILE_BYTES_MAX, fileTable } from "../file-table";
import type { UploadHead } from "../queries/upload";
import type { BenchGear } from "../queries/sheet";
import { Pick, UploadMapping } from "./upload-mapping";
import { UploadPreview } from "./upload-preview";

interface Chosen { file: File; rows: string[][]; delimiter: string; encoding: TextEncoding }
interface Trouble { message: string; fields: { path: string; message: string }[]; field?: string | undefined }
const DELIMITER_WORDS: Readonly<Record<string, string>> = { ",": "comma", ";": "semicolon", "\t": "tab", "|": "bar" };

/** From a file of readings to tests: choose, map, look, keep. Nothing is sent before the last key, and nothing chosen is lost by a no. */
export function UploadForm({ heads, gear, headId: given, nominal }: { heads: readonly UploadHead[]; gear: BenchGear; headId: string | null; nominal: number }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const fileId = useId();
  const nominalId = useId();
  const [headId, setHeadId] = useState(given ?? "");
  const [purpose, setPurpose] = useState("baseline");
  const [benchId, setBenchId] = useState(gear.benches[0]?.id ?? "");
  const [fixtureId, setFixtureId] = useState(gear.fixtures[0]?.id ?? "");
  const [pressure, setPressure] = useState(String(nominal));
  const [more, setMore] = useState({ valve: "", seatNote: "", flowedAt: "", reason: "" });
  const [units, setUnits] = useState({ flowUnit: "cfm", pressureUnit: "inH2O" });
  const [chosen, setChosen] = useState<Chosen | null>(null);
  const [mapping, setMapping] = useState<FileMapping | null>(null);
  const [leaveOut, setLeaveOut] = useState<ReadonlySet<number>>(new Set());
  const [trouble, setTrouble] = useState<Trouble | null>(null);
  const [pending, setPending] = useState(false);
  const request = useRef<string | null>(null);
  const head = heads.find((h) => h.id === headId);
  const read = useMemo(() => (chosen && mapping ? fileRows(chosen.rows, mapping, head?.cylinders ?? 1) : null), [chosen, mapping, head]);

  // The address names the head, so that its photographs stand below; file and choices stay as they are.
  const chooseHead = (id: string) => {
    setHeadId(id);
    router.replace(`/s/${slug}/flow/upload${id === "" ? "" : `?head=${id}`}`, { scroll: false });
  };
  const choose = async (file: File | undefined) => {
    setTrouble(null);
    if (!file) return;
    if (file.size > FILE_BYTES_MAX) return setTrouble({ message: "The file is larger than 1 MB. Send the readings of one session.", fields: [] });
    const { text, encoding } = decodeText(new Uint8Array(await file.arrayBuffer()));
    const { rows, delimiter } = fileTable(text);
    request.current = null;
    setLeaveOut(new Set());
    setMapping(guessMapping(rows));
    setChosen({ file, rows, delimiter, encoding });
  };
  const keep = async () => {
    if (!chosen || !mapping || pending) return;
    setPending(true);
    setTrouble(null);
    request.current ??= crypto.randomUUID();
    const form = new FormData();
    form.set("file", chosen.file);
    form.set("ask", JSON.stringify({ headId, purpose, benchId, fixtureId, nominal: pressure, ...units, ...more, flowedAt: more.flowedAt === "" ? "" : new Date(more.flowedAt).toISOString(), mapping, leaveOut: [...leaveOut] }));
    try {
      const response = await fetch(`/api/v1/s/${slug}/flow/upload`, { method: "POST", body: form, headers: { "idempotency-key": request.current } });
      const body = (await response.json()) as { title?: string; field?: string; fields?: Trouble["fields"]; tests?: unknown[]; readings?: number; already?: string[]; headId?: string };
      if (response.ok) {
        toast({ text: `${body.readings} readings kept in ${body.tests?.length} test${body.tests?.length === 1 ? "" : "s"}${body.already?.length ? `; ${body.already.length} were on record already` : ""}` });
        return router.push(`/s/${slug}/flow/${headId}`);
      }
      // A rule said no: the next try is another act.
      if (response.status < 500) request.current = null;
      setTrouble({ message: body.title ?? "Not kept.", fields: body.fields ?? [], field: body.field });
    } catch {
      setTrouble({ message: "There is no link to the shop's records. The file and every choice are still here; try again.", fields: [] });
    } finally {
      setPending(false);
    }
  };
  const set = (key: keyof typeof more) => (value: string) => setMore((old) => ({ ...old, [key]: value }));
  const unsettled = read ? read.refusals.filter((r) => !leaveOut.has(r.row)).length : 0;
  const missing = !headId ? "Choose the head first." : !benchId || !fixtureId ? "Add a bench and a bore adapter under Bench gear first." : !read ? "Choose a file first." : unsettled > 0 ? `${unsettled} refused row${unsettled === 1 ? "" : "s"}: mend, map anew or leave out.` : read.readings.length === 0 ? "No row holds a reading." : undefined;
  return (
    <Bays>
      {trouble ? <Note tone="stop" live title="Nothing was kept.">{trouble.message} {trouble.fields.map((f) => `${f.path}: ${f.message}`).join(" ")}</Note> : null}
      <Bay label="1. Of which head, read how">
        <div className="fields three">
          <Pick label="Head" value={headId} options={[{ value: "", label: "Choose the head" }, ...heads.map((h) => ({ value: h.id, label: `${h.mark}, ${h.family}` }))]} onChange={chooseHead} />
          <Pick label="Test" value={purpose} options={[{ value: "baseline", label: "Before work" }, { value: "after", label: "After work" }, { value: "interim", label: "A pass in between" }, { value: "check", label: "A check" }]} onChange={setPurpose} />
          <Pick label="Bench" value={benchId} options={gear.benches.map((b) => ({ value: b.id, label: b.name }))} onChange={setBenchId} />
          <Pick label="Bore adapter" value={fixtureId} options={gear.fixtures.map((f) => ({ value: f.id, label: `${f.name} (${f.boreMm} mm)` }))} onChange={setFixtureId} />
          <div className="field"><label htmlFor={nominalId}>Nominal pressure</label><span className="in"><input id={nominalId} className="at-r" inputMode="decimal" value={pressure} onChange={(e) => setPressure(e.target.value)} /><span className="unit">in H₂O</span></span></div>
          <Typed label="Flowed on" type="datetime-local" value={more.flowedAt} onChange={set("flowedAt")} hint="Empty = now. The bench check of that day counts." />
          <Typed label="Valve head" unit="mm" value={more.valve} onChange={set("valve")} hint="If one size." />
          <Typed label="Seats, as cut" value={more.seatNote} onChange={set("seatNote")} />
        </div>
      </Bay>
      <Bay label="2. The file" aside={chosen ? `${chosen.encoding}, ${DELIMITER_WORDS[chosen.delimiter] ?? "one column"}, ${chosen.rows.length} lines` : undefined}>
        <label htmlFor={fileId} className="label">Comma-separated text, at most 1 MB</label>
        <input id={fileId} type="file" accept=".csv,.txt,.tsv,text/csv,text/plain" onChange={(e) => void choose(e.target.files?.[0])} />
        {chosen && mapping ? <div className="mt-4"><UploadMapping rows={chosen.rows} mapping={mapping} onChange={(m) => { setMapping(m); setLeaveOut(new Set()); }} units={units} onUnits={setUnits} cylinders={head?.cylinders ?? 1} /></div> : null}
      </Bay>
      {read ? (
        <Bay label="3. What it says">
          <UploadPreview units={{ lift: mapping?.liftUnit ?? "in", ...units }} read={read} leaveOut={leaveOut} onLeaveOut={setLeaveOut} />
          <div className="fields one mt-4"><Typed label="Why doubtful readings are kept" value={more.reason} onChange={set("reason")} hint="Empty: a reading far from its neighbours stops the file, by its row." /></div>
        </Bay>
      ) : null}
      <div className="commit-bar"><span className="mid">All of it is kept, or nothing. The file itself stays with the head.</span><Button variant="go" pending={pending} pendingText="Keeping…" disabledReason={missing} onClick={() => void keep()}>Keep these readings</Button></div>
    </Bays>
  );
}

function Typed({ label, value, onChange, unit, hint, type = "text" }: { label: string; value: string; onChange: (value: string) => void; unit?: string; hint?: string; type?: string }) {
  const id = useId();
  return (
    <div className="field"><label htmlFor={id}>{label} <span className="opt">(optional)</span></label><span className="in"><input id={id} type={type} value={value} onChange={(e) => onChange(e.target.value)} />{unit ? <span className="unit">{unit}</span> : null}</span>{hint ? <p className="hint">{hint}</p> : null}</div>
  );
}
