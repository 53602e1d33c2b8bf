import "server-only";
import { createHmac, randomBytes, timingSafeEqual } from "node:crypto";
import { env } from "@/modules/access/env";

/** How long after a badge or PIN the tablet may act for the person. The screen itself locks after 10 s without a touch. */
export const PASS_SECONDS = 180;

const sign = (body: string): string => createHmac("sha256", env().NEXTAUTH_SECRET).update(`clock pass:${body}`).digest("base64url");

/** What the server hands a tablet when a person proved who they are: this person, this tablet, from now. */
export function givePass(p: { deviceId: string; personId: string; at: Date }): string {
  const body = `${p.deviceId}.${p.personId}.${p.at.getTime()}.${randomBytes(9).toString("base64url")}`;
  return `${body}.${sign(body)}`;
}

/** The person of a pass given to this tablet and good at that instant, or null. Two minutes of slack before it: clocks differ. */
export function personOfPass(pass: string, deviceId: string, at: Date): string | null {
  const m = /^(([0-9a-f-]{36})\.([0-9a-f-]{36})\.(\d{10,16})\.[\w-]{12})\.([\w-]{43})$/.exec(pass);
  const [, body = "", device, person = "", given, mac = ""] = m ?? [];
  if (!m || device !== deviceId || !timingSafeEqual(Buffer.from(sign(body)), Buffer.from(mac))) return null;
  const age = (at.getTime() - Number(given)) / 1000;
  return age >= -120 && age <= PASS_SECONDS ? person : null;
}
