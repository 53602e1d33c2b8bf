import "server-only";
import { createDecipheriv, createECDH, hkdfSync, type ECDH } from "node:crypto";
import { env } from "@/modules/access/env";

const CURVE = "prime256v1";
let kept: { secret: string; pair: ECDH } | undefined;

/** The server's own key pair, made from its secret, so that there is no key file to lose. */
function pair(): ECDH {
  const secret = env().VK_PIN_PEPPER;
  if (kept?.secret === secret) return kept.pair;
  const made = createECDH(CURVE);
  made.setPrivateKey(Buffer.from(hkdfSync("sha256", secret, "", "clock seal, p-256", 32)));
  kept = { secret, pair: made };
  return made;
}

/** What a tablet seals to: an uncompressed P-256 point, base64url. */
export const sealingKey = (): string => pair().getPublicKey("base64url");

/**
 * Opens what a tablet sealed while it had no link: `point.nonce.ciphertext`, ECDH P-256, HKDF-SHA-256, AES-256-GCM.
 * Null when it was not sealed to this server or was altered. Source: NIST SP 800-56A (ECDH), SP 800-38D (GCM).
 */
export function openSeal(box: string): string | null {
  try {
    const [point, nonce, sealed] = box.split(".").map((part) => Buffer.from(part, "base64url"));
    if (!point || !nonce || !sealed || sealed.length < 17) return null;
    const key = Buffer.from(hkdfSync("sha256", pair().computeSecret(point), point, "clock seal", 32));
    const opened = createDecipheriv("aes-256-gcm", key, nonce);
    opened.setAuthTag(sealed.subarray(-16));
    return Buffer.concat([opened.update(sealed.subarray(0, -16)), opened.final()]).toString("utf8");
  } catch {
    return null;
  }
}
