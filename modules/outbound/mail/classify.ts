import { MailFailure } from "./port";

interface Shape {
  code?: unknown;
  responseCode?: unknown;
  response?: unknown;
}

/** Errors of our own making: repeating the same message can't help. */
const OURS = new Set(["EMESSAGE", "EFILEACCESS", "EURLACCESS", "ECONFIG", "EREQUIRETLS", "EMAXRECIPIENTS"]);

/**
 * An error of the mail library as a `MailFailure`. 4yz replies and broken connections may be tried again,
 * 5yz replies may not; a wrong password is kept for another try, because it is put right on our side.
 * Source of the reply classes: RFC 5321 section 4.2.1.
 */
export function mailFailure(error: unknown): MailFailure {
  if (error instanceof MailFailure) return error;
  const { code, responseCode, response } = (typeof error === "object" && error !== null ? error : {}) as Shape;
  const reply = typeof responseCode === "number" && responseCode >= 400 && responseCode <= 599 ? responseCode : null;
  const said = typeof response === "string" ? response : error instanceof Error ? error.message : String(error);
  const kind = typeof code === "string" ? code : "";
  if (kind === "EAUTH" || kind === "ENOAUTH") {
    return new MailFailure(`The mail server did not accept our sign-in: ${said}`, true, reply, { cause: error });
  }
  if (reply !== null) {
    const retry = reply < 500;
    const verdict = retry ? "The mail server asked to try later" : "The mail server refused the message";
    return new MailFailure(`${verdict}: ${said}`, retry, reply, { cause: error });
  }
  if (OURS.has(kind)) return new MailFailure(`The message can't be sent: ${said}`, false, null, { cause: error });
  return new MailFailure(`The mail server can't be reached: ${said}`, true, null, { cause: error });
}
