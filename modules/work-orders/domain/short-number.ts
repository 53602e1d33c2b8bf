/** The part of a document number people say: `WO-2026-0118` -> `0118`. The whole stands wherever there is room. */
export const shortNumber = (number: string): string => number.split("-").at(-1) ?? number;
