/** What the HTTP API said when it said no. */
class ApiProblem extends Error {
  override readonly name = "ApiProblem";
  constructor(readonly status: number, title: string, readonly code: string | undefined, readonly reference: string | undefined) { super(title); }
}

async function answer<T>(response: Response): Promise<T> {
  if (response.ok) return (await response.json()) as T;
  const body = (await response.json().catch(() => ({}))) as { title?: string; code?: string; reference?: string };
  throw new ApiProblem(response.status, body.title ?? "No answer from the shop's records.", body.code, body.reference);
}

/** GET from our own API; undefined values are left out. @throws ApiProblem, TypeError without a link */
export async function getJson<T>(path: string, query: Record<string, string | number | undefined> = {}, signal?: AbortSignal): Promise<T> {
  const search = new URLSearchParams();
  for (const [k, v] of Object.entries(query)) if (v !== undefined && v !== "") search.set(k, String(v));
  return answer(await fetch(`${path}${search.size ? `?${search}` : ""}`, { ...(signal ? { signal } : {}), headers: { accept: "application/json" } }));
}

/** POST to our own API under a request id made once for this act. @throws ApiProblem, TypeError without a link */
export async function postJson<T>(path: string, body: unknown, requestId: string, headers: Record<string, string> = {}): Promise<T> {
  return answer(await fetch(path, { method: "POST", body: JSON.stringify(body), headers: { "content-type": "application/json", "idempotency-key": requestId, ...headers } }));
}
