import "server-only";
import { headers } from "next/headers";
import { env } from "./env";

/** Did this come from our own pages? A foreign or null Origin is refused; without one, the browser must say same-origin. */
export function isOwnOrigin(h: { get(name: string): string | null }): boolean {
  const origin = h.get("origin");
  if (origin) {
    const own = [env().VK_APP_URL, env().VK_APP_URL.replace("127.0.0.1", "localhost"), env().VK_APP_URL.replace("localhost", "127.0.0.1")];
    return own.some((u) => new URL(u).origin === origin);
  }
  return h.get("sec-fetch-site") === "same-origin";
}

export const sameOrigin = async (): Promise<boolean> => isOwnOrigin(await headers());
