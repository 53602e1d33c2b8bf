/** The token of a bench computer from 32 random bytes: 43 letters that stand in a header and an address as they are. */
export function benchTokenFrom(bytes: Uint8Array): string {
  if (bytes.length !== 32) throw new RangeError("a token takes 32 random bytes");
  return btoa(String.fromCharCode(...bytes)).replace(/\+/g, "-").replace(/\//g, "_").replace(/=+$/, "");
}
