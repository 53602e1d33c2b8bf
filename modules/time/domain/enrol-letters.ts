/** No letter or digit that is misread for another. */
const LETTERS = "23456789ABCDEFGHJKMNPQRSTVWXYZ";
const FAIR = Math.floor(256 / LETTERS.length) * LETTERS.length;

/**
 * A code of eight letters in two groups from random bytes, about 39 bits. Bytes that would favour some letters are passed over.
 * @throws RangeError when too few bytes are left: give 32 or more
 */
export function codeFrom(bytes: Uint8Array): string {
  const eight = [...bytes].filter((b) => b < FAIR).slice(0, 8).map((b) => LETTERS[b % LETTERS.length]).join("");
  if (eight.length < 8) throw new RangeError("too few random bytes");
  return `${eight.slice(0, 4)}-${eight.slice(4)}`;
}
