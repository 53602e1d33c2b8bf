import NextAuth from "next-auth";
import type { NextRequest } from "next/server";
import { authOptions } from "@/modules/access/auth";

const handler = (request: NextRequest, context: { params: Promise<{ nextauth: string[] }> }): Promise<Response> =>
  (NextAuth as unknown as (r: NextRequest, c: typeof context, o: ReturnType<typeof authOptions>) => Promise<Response>)(request, context, authOptions());

export { handler as GET, handler as POST };
