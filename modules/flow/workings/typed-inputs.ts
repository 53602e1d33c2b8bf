import { instantOf, instantsOf, localMinute } from "@/modules/kernel/instant";
import { refuse, type Refusal } from "@/modules/kernel/result";
import { FLOW_REFUSALS } from "../domain/flow-refusal";
import { typedNumber } from "../domain/typed-number";
import type { Field, Fields } from "./field";
import type { Answer } from "./output";
import { runWorking } from "./registry";
import type { Working } from "./working";

/** What stands in the wells, by the name of the input; one inside a record as `before.bench`. */
export type Typed = Readonly<Record<string, string>>;

/** What the screen shows beside the form. */
export type Worked =
  | { readonly state: "empty" }
  | { readonly state: "waiting"; readonly words: string }
  /** `at` names the well that the refusal is about. */
  | { readonly state: "refused"; readonly refusal: Refusal; readonly at: Readonly<Record<string, string>> }
  | { readonly state: "answered"; readonly answer: Answer };

type Read = { readonly value: unknown } | { readonly fault: string };

/** Longest text of one well that is read out of an address. */
const TEXT_MOST = 4000;

function readNumbers(text: string): Read {
  const found: number[] = [];
  for (const piece of text.split(/[\s;]+/)) {
    const number = typedNumber(piece.replace(/,$/, ""));
    if (!number.ok) return { fault: `“${piece.slice(0, 24)}” is not a number. Put a space between numbers; a comma or a point is for decimals.` };
    found.push(number.value);
  }
  return { value: found };
}

/** One well as a value of the API. The text is not empty. */
function readField(field: Field, text: string, zone: string): Read {
  switch (field.kind) {
    case "number": {
      const number = typedNumber(text);
      return number.ok ? { value: number.value } : { fault: FLOW_REFUSALS.NUMBER_NOT_FINITE };
    }
    case "numbers": return readNumbers(text);
    case "one_or_more": {
      const list = readNumbers(text);
      return "value" in list && Array.isArray(list.value) && list.value.length === 1 ? { value: list.value[0] as number } : list;
    }
    case "yes": return { value: text === "yes" };
    case "words": return { value: text.split(/[,;\n]+/).map((w) => w.trim()).filter((w) => w !== "") };
    case "instant": return instantsOf(text, zone).length > 0 ? { value: instantOf(text, zone).toISOString() } : { fault: "A date and a time that the clock showed." };
    case "choice": case "word": case "record": return { value: text };
  }
}

/** Everything typed as inputs of the API; faults by well. What is empty is left out. */
export function readTyped(fields: Fields, typed: Typed, zone: string, before = ""): { inputs: Record<string, unknown>; faults: Record<string, string> } {
  const inputs: Record<string, unknown> = {};
  const faults: Record<string, string> = {};
  for (const [key, field] of Object.entries(fields)) {
    if (field.fields) {
      const inner = readTyped(field.fields, typed, zone, `${before}${key}.`);
      Object.assign(faults, inner.faults);
      if (Object.keys(inner.inputs).length > 0) inputs[key] = inner.inputs;
      continue;
    }
    const text = (typed[before + key] ?? "").trim();
    if (text === "") continue;
    const read = readField(field, text, zone);
    if ("fault" in read) faults[before + key] = read.fault;
    else inputs[key] = read.value;
  }
  return { inputs, faults };
}

const labelled = (field: Field): string => (field.unit ? `${field.label}, ${field.unit}` : field.label);

/** What a working says to what is typed so far. */
export function workTyped(working: Working, typed: Typed, shop: { readonly zone: string; readonly estimatesOn: boolean }): Worked {
  const { inputs, faults } = readTyped(working.fields, typed, shop.zone);
  if (working.isEstimate && !shop.estimatesOn) {
    const off = runWorking(working, inputs, shop);
    if (!off.ok) return { state: "refused", refusal: off.refusal, at: {} };
  }
  const [firstFault] = Object.values(faults);
  if (firstFault !== undefined) return { state: "refused", refusal: refuse("NUMBER_NOT_FINITE", firstFault).refusal, at: faults };
  if (Object.keys(inputs).length === 0) return { state: "empty" };
  const lacking = Object.entries(working.fields).filter(([key, f]) => !f.optional && !(key in inputs)).map(([, f]) => labelled(f));
  if (lacking.length > 0) return { state: "waiting", words: `Still to type: ${lacking.join("; ")}.` };
  const made = runWorking(working, inputs, shop);
  if (made.ok) return { state: "answered", answer: made.value };
  const { refusal } = made;
  const nameOf = (key: string): string => { const f = working.fields[key]; return f ? labelled(f) : key; };
  if (refusal.code === "INPUT_MISSING") return { state: "waiting", words: wordsWithLabels(refusal.message, working.fields) };
  const at = Object.fromEntries((refusal.fields ?? (refusal.field ? [{ path: refusal.field, message: refusal.message }] : [])).map((f) => [wellOf(working.fields, f.path), f.message]));
  const message = refusal.code === "INPUT_NOT_ACCEPTED" && refusal.field ? (refusal.fields ?? []).map((f) => `${nameOf(wellOf(working.fields, f.path))}: ${f.message}`).join(" ") : wordsWithLabels(refusal.message, working.fields);
  return { state: "refused", refusal: { ...refusal, message }, at };
}

/** The well that a path of the API lies in: an entry of a list belongs to its list. */
function wellOf(fields: Fields, path: string): string {
  const [key = "", inner] = path.split(".");
  return inner !== undefined && fields[key]?.fields ? `${key}.${inner}` : key;
}

/** A refusal for a person: names of inputs become their labels. */
const wordsWithLabels = (message: string, fields: Fields): string =>
  Object.entries(fields).reduce((text, [key, field]) => (key.includes("_") ? text.replace(new RegExp(`\\b${key}\\b`, "g"), `“${labelled(field)}”`) : text), message);

/** The worked example as it would be typed in the shop. */
export function exampleTyped(working: Working, zone: string): Typed {
  const texts = (fields: Fields, keys: readonly string[], before: string): [string, string][] => keys.flatMap((key) => {
    const field = fields[key];
    if (!field) return [];
    if (field.fields) return texts(field.fields, Object.keys(field.fields), `${before}${key}.`);
    return [[before + key, field.kind === "instant" ? localMinute(new Date(field.example), zone) : field.example]];
  });
  return Object.fromEntries(texts(working.fields, working.worked, ""));
}

const wellsOf = (fields: Fields, before = ""): string[] => Object.entries(fields).flatMap(([key, f]) => (f.fields ? wellsOf(f.fields, `${before}${key}.`) : [before + key]));

/** What an address says stands in the wells of a working; names it does not know are passed over. */
export const typedOfAddress = (working: Working, asked: URLSearchParams): Typed =>
  Object.fromEntries(wellsOf(working.fields).flatMap((well) => { const text = asked.get(well); return text ? [[well, text.slice(0, TEXT_MOST)]] : []; }));

/** The part of the address that holds a working and what was typed, so that it can be sent on. */
export function addressOf(name: string, typed: Typed): string {
  const kept = Object.entries(typed).filter(([, text]) => text.trim() !== "").map(([well, text]) => [well, text.trim().replace(/\s+/g, " ")]);
  return `?${new URLSearchParams([["f", name], ...kept]).toString()}`;
}
