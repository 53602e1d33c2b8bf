import { z } from "@/modules/kernel/zod";

export type FieldKind = "number" | "numbers" | "one_or_more" | "choice" | "yes" | "words" | "word" | "instant" | "record";

/** One input of a working: what it is called, how it is typed, and the schema that a value of the API must pass. */
export interface Field<T = unknown> {
  readonly kind: FieldKind;
  readonly label: string;
  /** Stands beside the well; empty for a bare number or a word. */
  readonly unit: string;
  /** As it would be typed. */
  readonly example: string;
  readonly optional: boolean;
  readonly hint?: string;
  readonly options?: readonly { readonly value: string; readonly label: string }[];
  /** Inputs inside a record. */
  readonly fields?: Fields;
  readonly schema: z.ZodType<T>;
}
export type Fields = Readonly<Record<string, Field>>;
/** What the calculation gets of a set of inputs. */
export type ValuesOf<F extends Fields> = { readonly [K in keyof F]: F[K] extends Field<infer T> ? T : never };

export interface Limits { readonly min?: number; readonly max?: number }

/** Beyond this no input of the bench means anything; squares and cubes of it are still finite. */
const MOST = 1e9;
/** Entries of one list. */
const LIST_MOST = 200;

const needed = (what: string) => ({ error: (issue: { input?: unknown }) => (issue.input === undefined ? `Needed: ${what}.` : `Here stands ${what}.`) });
const limitWords = ({ min, max }: Limits): string =>
  min !== undefined && max !== undefined ? `A number from ${min} to ${max}.` : min !== undefined ? `A number of at least ${min}.` : max !== undefined ? `A number of at most ${max}.` : `A number between ${-MOST} and ${MOST}.`;

const oneNumber = (limits: Limits): z.ZodType<number> =>
  z.number(needed("a number")).min(limits.min ?? -MOST, limitWords(limits)).max(limits.max ?? MOST, limitWords(limits));
const manyNumbers = (limits: Limits): z.ZodType<number[]> =>
  z.array(oneNumber(limits), needed("a list of numbers")).min(1, "At least one number.").max(LIST_MOST, `At most ${LIST_MOST} numbers.`);

export const num = (label: string, unit: string, example: string, limits: Limits = {}): Field<number> =>
  ({ kind: "number", label, unit, example, optional: false, schema: oneNumber(limits) });

export const nums = (label: string, unit: string, example: string, limits: Limits = {}): Field<number[]> =>
  ({ kind: "numbers", label, unit, example, optional: false, hint: "Numbers with a space or a line between them.", schema: manyNumbers(limits) });

/** One number, or a list of them. */
export const oneOrMore = (label: string, unit: string, example: string, limits: Limits = {}): Field<number | number[]> =>
  ({ kind: "one_or_more", label, unit, example, optional: false, hint: "One number, or several with a space between them.", schema: z.union([oneNumber(limits), manyNumbers(limits)], needed("a number or a list of numbers")) });

export const choice = <K extends string>(label: string, words: Readonly<Record<K, string>>, example: NoInfer<K>): Field<K> => {
  const keys = Object.keys(words) as [K, ...K[]];
  return {
    kind: "choice", label, unit: "", example, optional: false,
    options: keys.map((value) => ({ value, label: words[value] })),
    schema: z.enum(keys, needed(`one of ${keys.join(", ")}`)) as unknown as z.ZodType<K>,
  };
};

export const yesNo = (label: string, example: "yes" | "no"): Field<boolean> =>
  ({ kind: "yes", label, unit: "", example, optional: false, schema: z.boolean(needed("true or false")) });

export const word = (label: string, example: string): Field<string> =>
  ({ kind: "word", label, unit: "", example, optional: false, schema: z.string(needed("a text")).min(1, "Needed: a text.").max(80, "At most 80 characters.") });

export const words = (label: string, example: string): Field<string[]> =>
  ({ kind: "words", label, unit: "", example, optional: false, hint: "With a comma between them.", schema: z.array(z.string().min(1).max(80), needed("a list of texts")).min(1, "At least one.").max(20, "At most 20.") });

/** A moment: in the API with its offset (`2026-02-03T09:00:00Z`), on a screen in the shop's zone. */
export const instant = (label: string, example: string): Field<string> =>
  ({ kind: "instant", label, unit: "", example, optional: false, schema: z.iso.datetime({ offset: true, error: "Needed: date and time with offset, such as 2026-02-03T09:00:00Z." }) });

export const record = <F extends Fields>(label: string, fields: F): Field<ValuesOf<F>> =>
  ({ kind: "record", label, unit: "", example: "", optional: false, fields, schema: schemaOf(fields, label) as z.ZodType<ValuesOf<F>> });

/** May be left out. */
export const maybe = <T>(field: Field<T>, hint?: string): Field<T | undefined> =>
  ({ ...field, optional: true, ...(hint === undefined ? {} : { hint }), schema: field.schema.optional() });

/** Strict schema of a set of inputs: a name nobody knows is refused, not passed over. */
export function schemaOf(fields: Fields, of: string): z.ZodType<Record<string, unknown>> {
  return z.strictObject(Object.fromEntries(Object.entries(fields).map(([key, f]) => [key, f.schema])), {
    error: (issue) => (issue.code === "unrecognized_keys" ? `${of} takes no ${issue.keys.join(", ")}. It takes ${Object.keys(fields).join(", ")}.` : `Needed: ${of}, by its names.`),
  });
}
