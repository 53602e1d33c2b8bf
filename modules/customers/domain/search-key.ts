/** Name as it is looked up: lower case, accents off, single blanks. */
export const nameKey = (name: string): string =>
  name.normalize("NFKD").replace(/\p{M}+/gu, "").toLowerCase().replace(/\s+/g, " ").trim();

/** Digits of a telephone number, so that the last four find it. */
export const phoneDigits = (phone: string): string => phone.replace(/\D+/g, "");
