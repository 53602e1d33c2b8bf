"use client";

import { useId } from "react";
import { Icon } from "@/modules/ui/icon";
import type { FileMapping } from "../domain/file-rows";

type ColumnKey = "lift" | "flow" | "pressure" | "side" | "cylinder" | "repeat" | "range";
const COLUMNS: readonly { key: ColumnKey; label: string; must: boolean }[] = [
  { key: "lift", label: "Lift", must: true }, { key: "flow", label: "Reading", must: true }, { key: "pressure", label: "Pressure held", must: false }, { key: "side", label: "Side", must: false },
  { key: "cylinder", label: "Port number", must: false }, { key: "repeat", label: "Repeat number", must: false }, { key: "range", label: "Range", must: false },
];

export function Pick({ label, value, options, onChange, hint }: { label: string; value: string; options: readonly { value: string; label: string }[]; onChange: (value: string) => void; hint?: string }) {
  const id = useId();
  return (
    <div className="field">
      <label htmlFor={id}>{label}</label>
      <span className="in"><select id={id} value={value} onChange={(e) => onChange(e.target.value)}>{options.map((o) => <option key={o.value} value={o.value}>{o.label}</option>)}</select><Icon name="down" size={14} /></span>
      {hint ? <p className="hint">{hint}</p> : null}
    </div>
  );
}

/** Which column holds what, and in which unit. Every choice shows at once in the preview. */
export function UploadMapping({ rows, mapping, onChange, units, onUnits, cylinders }: {
  rows: readonly (readonly string[])[]; mapping: FileMapping; onChange: (next: FileMapping) => void; units: { flowUnit: string; pressureUnit: string }; onUnits: (next: { flowUnit: string; pressureUnit: string }) => void; cylinders: number;
}) {
  const width = Math.max(0, ...rows.slice(0, 20).map((r) => r.length));
  const head = mapping.headerRows > 0 ? rows[mapping.headerRows - 1] : undefined;
  const sample = rows[mapping.headerRows] ?? [];
  const named = Array.from({ length: width }, (_, i) => ({ value: String(i), label: `${i + 1}: ${head?.[i]?.trim() || sample[i]?.trim() || "empty"}` }));
  return (
    <div className="fields three">
      {COLUMNS.map(({ key, label, must }) => (
        <Pick key={key} label={label} value={mapping[key] === null ? "" : String(mapping[key])} options={must ? named : [{ value: "", label: "Not in the file" }, ...named]}
          onChange={(v) => onChange({ ...mapping, [key]: v === "" ? null : Number(v) })} />
      ))}
      {mapping.side === null ? <Pick label="All rows are" value={mapping.fixedSide} options={[{ value: "intake", label: "Intake" }, { value: "exhaust", label: "Exhaust" }]} onChange={(v) => onChange({ ...mapping, fixedSide: v === "exhaust" ? "exhaust" : "intake" })} /> : null}
      {mapping.cylinder === null && cylinders > 1 ? <Pick label="All rows are of port" value={String(mapping.fixedCylinder)} options={Array.from({ length: cylinders }, (_, i) => ({ value: String(i + 1), label: String(i + 1) }))} onChange={(v) => onChange({ ...mapping, fixedCylinder: Number(v) })} /> : null}
      <Pick label="Lifts are in" value={mapping.liftUnit} options={[{ value: "in", label: "in" }, { value: "mm", label: "mm" }]} onChange={(v) => onChange({ ...mapping, liftUnit: v === "mm" ? "mm" : "in" })} />
      <Pick label="Readings are in" value={units.flowUnit} options={[{ value: "cfm", label: "CFM" }, { value: "L/s", label: "L/s" }, { value: "m3/h", label: "m³/h" }, { value: "percent", label: "percent of range" }, { value: "head", label: "orifice head" }]} onChange={(flowUnit) => onUnits({ ...units, flowUnit })} />
      {mapping.pressure === null ? null : <Pick label="Pressure is in" value={units.pressureUnit} options={[{ value: "inH2O", label: "in H₂O" }, { value: "kPa", label: "kPa" }, { value: "hPa", label: "hPa" }, { value: "Pa", label: "Pa" }]} onChange={(pressureUnit) => onUnits({ ...units, pressureUnit })} />}
      <Pick label="Decimals by" value={mapping.decimal} options={[{ value: ".", label: "point: 24.6" }, { value: ",", label: "comma: 24,6" }]} onChange={(v) => onChange({ ...mapping, decimal: v === "," ? "," : "." })} />
      <Pick label="Head lines" value={String(mapping.headerRows)} options={[0, 1, 2, 3, 4, 5].map((n) => ({ value: String(n), label: n === 0 ? "none" : String(n) }))} onChange={(v) => onChange({ ...mapping, headerRows: Number(v) })} />
    </div>
  );
}
