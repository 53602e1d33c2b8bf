import { DEVICE_COOKIE } from "@/modules/access/device";
import { isOwnOrigin } from "@/modules/access/origin";
import { problemOf } from "@/modules/access/problem";
import { requestFacts } from "@/modules/access/session";
import { enrolTablet } from "@/modules/time/identity/enrol";

const TWO_YEARS = 2 * 365 * 86_400;
const answer = (status: number, body: object, headers: HeadersInit = {}) => Response.json(body, { status, headers: { "cache-control": "no-store", ...headers } });

/** A tablet that is nobody yet types its code; the token goes into a cookie no script can read. */
export async function POST(request: Request): Promise<Response> {
  try {
    if (!isOwnOrigin(request.headers)) return answer(403, { title: "This came from another site." });
    const text = (await request.text()).slice(0, 1000);
    const code = /"code"\s*:\s*"([^"]{1,40})"/.exec(text)?.[1];
    if (!code) return answer(422, { title: "Type the code the manager gave you.", field: "code" });
    const done = await enrolTablet(code, await requestFacts());
    if (!done.ok) return answer(422, { title: done.refusal.message, code: done.refusal.code, field: "code" });
    const { token, name } = done.value;
    return answer(200, { name }, { "set-cookie": `${DEVICE_COOKIE}=${token}; Path=/; Max-Age=${TWO_YEARS}; HttpOnly; Secure; SameSite=Strict` });
  } catch (error) {
    return problemOf("clock.enrol", error, "The tablet could not be enrolled. Try again.");
  }
}
