const text = new TextEncoder();
const base64url = (bytes: ArrayBuffer | Uint8Array): string => {
  let s = "";
  for (const b of new Uint8Array(bytes)) s += String.fromCharCode(b);
  return btoa(s).replaceAll("+", "-").replaceAll("/", "_").replaceAll("=", "");
};
const fromBase64url = (s: string): Uint8Array<ArrayBuffer> => Uint8Array.from(atob(s.replaceAll("-", "+").replaceAll("_", "/")), (c) => c.charCodeAt(0));

/**
 * Seals a badge or PIN to the server's key for one act, so that what waits on the tablet cannot be read there.
 * Throw-away P-256 key, ECDH, HKDF-SHA-256, AES-256-GCM. @throws where the browser gives no cryptography (no https)
 */
export async function sealProof(sealKey: string, secret: { actId: string } & ({ pin: string } | { badge: string })): Promise<string> {
  const curve = { name: "ECDH", namedCurve: "P-256" };
  const server = await crypto.subtle.importKey("raw", fromBase64url(sealKey), curve, false, []);
  const own = await crypto.subtle.generateKey(curve, false, ["deriveBits"]);
  const point = await crypto.subtle.exportKey("raw", own.publicKey);
  const shared = await crypto.subtle.deriveBits({ name: "ECDH", public: server }, own.privateKey, 256);
  const stretch = await crypto.subtle.importKey("raw", shared, "HKDF", false, ["deriveKey"]);
  const key = await crypto.subtle.deriveKey({ name: "HKDF", hash: "SHA-256", salt: point, info: text.encode("clock seal") }, stretch, { name: "AES-GCM", length: 256 }, false, ["encrypt"]);
  const nonce = crypto.getRandomValues(new Uint8Array(12));
  const sealed = await crypto.subtle.encrypt({ name: "AES-GCM", iv: nonce }, key, text.encode(JSON.stringify(secret)));
  return [point, nonce, sealed].map(base64url).join(".");
}

/** As the server makes it for the board: tells a badge without a link, and gives none away in plain sight. */
export const badgeDigest = async (deviceId: string, badge: string): Promise<string> => base64url(await crypto.subtle.digest("SHA-256", text.encode(`${deviceId}:${badge}`)));
