import { signedIn } from "@/modules/access/session";
import { openApiDocument } from "@/modules/access/openapi";
import { env } from "@/modules/access/env";
import { ENDPOINTS } from "./endpoints";

/** The API's document, for people of a shop. */
export async function GET(): Promise<Response> {
  if (!(await signedIn())) return Response.json({ title: "Sign in first.", status: 401 }, { status: 401 });
  return Response.json(openApiDocument(ENDPOINTS, env().VK_APP_URL));
}
