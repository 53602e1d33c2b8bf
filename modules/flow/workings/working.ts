import { ok, refuse, type Refused, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { schemaOf, type Fields, type ValuesOf } from "./field";
import type { Answer, Output, Value } from "./output";

/** Sets of inputs of which one is given, whole; or, where `optional`, at most one. */
export interface Either { readonly of: readonly (readonly string[])[]; readonly optional?: true }

/** What a calculation hands back: figures that are not determined stay `undefined`. */
export interface Made { readonly values: Readonly<Record<string, Value | undefined>>; readonly flags?: readonly string[] }

interface Description {
  /** The name programs call it by. */
  readonly name: string;
  readonly title: string;
  /** What it is for, in one sentence. */
  readonly purpose: string;
  readonly outputs: readonly Output[];
  readonly either?: readonly Either[];
  /** Inputs of the worked example; all that are needed where it is left out. */
  readonly worked?: readonly string[];
  /** Where the rule comes from, and whether that was read or remembered. */
  readonly source: string;
  readonly caution?: string;
  /** Engine speed or power out of airflow: only where the owner switched estimates on. */
  readonly isEstimate?: true;
}
interface Spec<F extends Fields> extends Description {
  readonly fields: F;
  /** Names the domain gives an input where they differ from ours by more than underscores. */
  readonly called?: Readonly<Record<string, string>>;
  readonly compute: (values: ValuesOf<F>) => Result<Made>;
}

/** A function of the bench with its inputs, outputs, source and caution. Pure. */
export interface Working extends Description {
  readonly fields: Fields;
  readonly either: readonly Either[];
  readonly worked: readonly string[];
  readonly schema: z.ZodType<Record<string, unknown>>;
  /** From inputs that passed the schema. */
  readonly compute: (values: Readonly<Record<string, unknown>>) => Result<Made>;
  /** From whatever came. A refusal has a code and words, and no number. */
  readonly run: (inputs: unknown) => Result<Answer>;
}

const plain = (name: string): string => name.toLowerCase().replace(/[^a-z0-9.]/g, "");

/** Our name of the input that a refusal of the domain is about. */
export function keyOfField(fields: Fields, called: Readonly<Record<string, string>>, field: string): string | undefined {
  if (field in fields) return field;
  if (called[field]) return called[field];
  return Object.keys(fields).find((key) => plain(key) === plain(field));
}

/** Refuses for an input that this choice of the others needs. */
export const missing = (field: string, because: string): Refused => refuse("INPUT_MISSING", `${because} needs ${field} too.`, { field });

const setWords = (sets: readonly (readonly string[])[]): string => sets.map((set) => set.join(" with ")).join(", or ");

/** Refuses where two ways of saying one thing are given, or none, or half of one. */
function refuseEither(either: readonly Either[], values: Readonly<Record<string, unknown>>): Refused | null {
  for (const { of, optional } of either) {
    const begun = of.filter((set) => set.some((key) => values[key] !== undefined));
    if (begun.length > 1) return refuse("INPUT_TWICE", `Give one of them only: ${setWords(of)}.`, { field: begun[1]?.find((key) => values[key] !== undefined) });
    const lacking = begun[0]?.find((key) => values[key] === undefined);
    if (lacking !== undefined) return refuse("INPUT_MISSING", `Needed: ${setWords(begun)}.`, { field: lacking });
    if (begun.length === 0 && !optional) return refuse("INPUT_MISSING", `Needed: ${setWords(of)}.`, { field: of[0]?.[0] });
  }
  return null;
}

/** The input that was really given, where a refusal names the other way of saying the same. */
function asGiven(either: readonly Either[], values: Readonly<Record<string, unknown>>, key: string): string {
  if (values[key] !== undefined) return key;
  for (const { of } of either) {
    const at = of.find((set) => set.includes(key))?.indexOf(key);
    const given = of.find((set) => set.every((k) => values[k] !== undefined));
    if (at !== undefined && given) return given[at] ?? given[0] ?? key;
  }
  return key;
}

const isFiniteThroughout = (value: unknown): boolean =>
  typeof value === "number" ? Number.isFinite(value) : typeof value === "object" && value !== null ? Object.values(value).every(isFiniteThroughout) : true;

/** Nothing below nothing: −0 is 0, here and in JSON. */
const plainZero = (value: Value): Value => (Object.is(value, -0) ? 0 : Array.isArray(value) ? (value.map((v: unknown) => (Object.is(v, -0) ? 0 : v)) as Value) : value);

function accepted(schema: Working["schema"], inputs: unknown): Result<Record<string, unknown>> {
  const parsed = schema.safeParse(inputs);
  if (parsed.success) return ok(parsed.data);
  const fields = parsed.error.issues.map((i) => ({ path: i.path.join("."), message: i.message }));
  const [first] = fields;
  return { ok: false, refusal: { code: "INPUT_NOT_ACCEPTED", message: fields.length === 1 && first ? `${first.path ? `${first.path}: ` : ""}${first.message}` : "Some inputs need another look.", ...(first?.path ? { field: first.path } : {}), fields } };
}

/** Makes a working out of its description: strict inputs, refusals by our names, no number that is none. */
export function working<F extends Fields>(spec: Spec<F>): Working {
  const { compute: computed, called = {}, ...description } = spec;
  const schema = schemaOf(spec.fields, spec.name);
  const either = spec.either ?? [];
  // The schema vouches for the values; their types are those of the fields.
  const compute = (values: Readonly<Record<string, unknown>>): Result<Made> => {
    const clash = refuseEither(either, values);
    if (clash) return clash;
    const made = computed(values as ValuesOf<F>);
    if (made.ok || made.refusal.field === undefined) return made;
    const { field, ...refusal } = made.refusal;
    const key = keyOfField(spec.fields, called, field);
    // A code of our own is about what is missing or too much, so it names that input itself.
    const input = key === undefined || refusal.code.startsWith("INPUT_") ? key : asGiven(either, values, key);
    return { ok: false, refusal: { ...refusal, ...(input === undefined ? {} : { field: input }) } };
  };
  return {
    ...description, schema, either, compute,
    worked: spec.worked ?? Object.keys(spec.fields).filter((key) => spec.fields[key]?.optional === false),
    run(inputs) {
      const given = accepted(schema, inputs);
      if (!given.ok) return given;
      const made = compute(given.value);
      if (!made.ok) return made;
      const values = Object.fromEntries(Object.entries(made.value.values).flatMap(([key, value]) => (value === undefined ? [] : [[key, plainZero(value)] as const])));
      if (!isFiniteThroughout(values)) return refuse("ANSWER_NOT_FINITE", "These inputs give no finite answer. Check the size and unit of each one.");
      return ok({ values, flags: made.value.flags ?? [] });
    },
  };
}

/** An answer by the names of the working. */
export const named = <T>(result: Result<T>, name: (value: T) => Made): Result<Made> => (result.ok ? ok(name(result.value)) : result);
