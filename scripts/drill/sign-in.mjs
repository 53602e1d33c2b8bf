/** Signs in the way a browser does: the token of the form, the credentials, the cookie. */
const jarOf = (response, jar) => {
  for (const cookie of response.headers.getSetCookie()) {
    const [pair] = cookie.split(";");
    const [name, ...value] = pair.split("=");
    jar.set(name.trim(), value.join("="));
  }
};
const header = (jar) => [...jar].map(([name, value]) => `${name}=${value}`).join("; ");

/** @returns the Cookie header of a signed-in person. @throws when the sign-in is refused */
export async function signIn(appUrl, { email, password }) {
  const jar = new Map();
  const form = await fetch(`${appUrl}/api/auth/csrf`, { signal: AbortSignal.timeout(60_000) });
  jarOf(form, jar);
  const { csrfToken } = await form.json();
  const answer = await fetch(`${appUrl}/api/auth/callback/credentials`, {
    method: "POST", redirect: "manual", signal: AbortSignal.timeout(60_000),
    headers: { "content-type": "application/x-www-form-urlencoded", cookie: header(jar), origin: appUrl },
    body: new URLSearchParams({ csrfToken, email, password, json: "true", callbackUrl: appUrl }),
  });
  jarOf(answer, jar);
  if (![...jar.keys()].some((name) => name.endsWith("session-token"))) throw new Error(`${email} was not let in (${answer.status})`);
  return header(jar);
}
