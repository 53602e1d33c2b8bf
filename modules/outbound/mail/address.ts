import { ok, refuse, type Result } from "@/modules/kernel/result";

const ATOM = "[A-Za-z0-9!#$%&'*+/=?^_`{|}~-]+";
const LOCAL = new RegExp(`^${ATOM}(?:\\.${ATOM})*$`);
const LABEL = /^[A-Za-z0-9](?:[A-Za-z0-9-]{0,61}[A-Za-z0-9])?$/;

const wanted = "Write one address such as name@example.com.";
const no = (what: string) => refuse("mail_address", `${what} ${wanted}`);

/**
 * One plain e-mail address, trimmed, its domain in lower case.
 *
 * Deliberately narrower than the mail standard: a dot-atom before the `@` (at most 64 characters) and a
 * dotted host name after it (whole address at most 254). Quoted names, comments, groups, display names,
 * address literals and several addresses are refused, because each has been a way to redirect a message.
 * Source: RFC 5322 section 3.2.3 (dot-atom), RFC 5321 section 4.5.3.1 and its erratum 1690 (lengths),
 * RFC 1123 section 2.1 (host labels).
 */
export function parseAddress(text: string): Result<string> {
  if (/[\r\n\0]/.test(text)) return no("An e-mail address is a single line.");
  const trimmed = text.trim();
  if (trimmed === "") return no("The e-mail address is missing.");
  if (trimmed.length > 254) return no("An e-mail address has at most 254 characters.");
  if (/[^\x00-\x7f]/.test(trimmed)) return no("The address holds a letter that mail servers can't be trusted to carry.");
  if (/[,;:<>()[\]"\\\s]/.test(trimmed)) return no("Only the bare address of one person fits here.");
  const at = trimmed.indexOf("@");
  if (at < 0) return no("The @ is missing.");
  if (at !== trimmed.lastIndexOf("@")) return no("There is more than one @.");
  const local = trimmed.slice(0, at);
  const host = trimmed.slice(at + 1).toLowerCase();
  if (local.length > 64 || !LOCAL.test(local)) return no("The part before the @ is not valid.");
  const labels = host.split(".");
  if (labels.length < 2 || !labels.every((label) => LABEL.test(label))) return no("The part after the @ is not a domain.");
  if (/^\d+$/.test(labels.at(-1) ?? "")) return no("The part after the @ is not a domain.");
  return ok(`${local}@${host}`);
}
