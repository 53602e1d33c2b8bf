import { env } from "@/modules/access/env";
import { openApiDocument } from "@/modules/access/openapi";
import { problem, problemOf } from "@/modules/access/problem";
import { signedIn } from "@/modules/access/session";
import { ENDPOINTS } from "./endpoints";

/** The API's document, for people of a shop. */
export async function GET(): Promise<Response> {
  try {
    if (!(await signedIn())) return problem(401, "Sign in first.");
    return Response.json(openApiDocument(ENDPOINTS, env().VK_APP_URL));
  } catch (error) {
    return problemOf("openapi", error);
  }
}
