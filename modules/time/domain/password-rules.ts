/** A password that stands alone. Source: NIST SP 800-63B-4, 3.1.1.2: at least 15 characters, every printable one allowed, no rules of composition. */
export const PASSWORD_LENGTH_MIN = 15;
const PASSWORD_LENGTH_MAX = 256;

/** Phrases that are long enough and tried first all the same. Ours; grows with the list a shop brings. */
const KNOWN = ["password", "passwort", "qwertyuiop", "asdfghjkl", "letmein", "iloveyou", "administrator", "1234567890", "welcome", "valvekeeper", "correcthorsebatterystaple"];

/** What is wrong with a password somebody wants, in words, or null. `about` are words tied to the person: name, shop, address. */
export function passwordProblem(password: string, about: readonly string[] = []): string | null {
  const text = password.normalize("NFKC");
  const length = [...text].length;
  if (length < PASSWORD_LENGTH_MIN) return `At least ${PASSWORD_LENGTH_MIN} characters; a few words that only you put together do well. This has ${length}.`;
  if (length > PASSWORD_LENGTH_MAX) return `At most ${PASSWORD_LENGTH_MAX} characters.`;
  const plain = text.toLowerCase().replace(/[^\p{L}\p{N}]/gu, "");
  let rest = plain;
  for (const word of [...KNOWN, ...about.flatMap((a) => a.toLowerCase().split(/[^\p{L}\p{N}]+/u))].filter((w) => w.length >= 3)) rest = rest.replaceAll(word, "");
  if (new Set(rest).size < 5) return "This is one of the first that are tried, or it repeats itself. Put a few words together that have nothing to do with you or the shop.";
  return null;
}
