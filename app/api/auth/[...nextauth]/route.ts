import NextAuth from "next-auth";
import type { NextRequest } from "next/server";
import { authOptions } from "@/modules/access/auth";
import { problemOf } from "@/modules/access/problem";
import { RETRY_AFTER_S, TRY_AGAIN } from "@/modules/kernel/away";

type Context = { params: Promise<{ nextauth: string[] }> };
const answer = NextAuth as unknown as (request: NextRequest, context: Context, options: ReturnType<typeof authOptions>) => Promise<Response>;

/** next-auth's own addresses. It has one status for every sign-in that did not work; one that could not be tried is not a wrong password. */
async function handler(request: NextRequest, context: Context): Promise<Response> {
  try {
    const response = await answer(request, context, authOptions());
    if (response.status !== 401) return response;
    const body = await response.text();
    const headers = new Headers(response.headers);
    const isAway = body.includes(`error=${TRY_AGAIN}`);
    if (isAway) headers.set("retry-after", String(RETRY_AFTER_S));
    return new Response(body, { status: isAway ? 503 : 401, headers });
  } catch (error) {
    return problemOf("sign-in", error);
  }
}

export { handler as GET, handler as POST };
