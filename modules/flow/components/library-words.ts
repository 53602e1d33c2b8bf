import { HEAD_WORK } from "../gear-input";
import type { Purpose } from "../domain/raw-test";

export const PURPOSE_WORDS: Readonly<Record<Purpose, string>> = { baseline: "before", after: "after", interim: "pass", check: "check" };
export const WORK_KINDS = HEAD_WORK;
/** `port 2 intake`; the number is left out where a head has one cylinder. */
export const portWords = (cylinder: number, side: string): string => (cylinder === 1 ? side : `port ${cylinder} ${side}`);
