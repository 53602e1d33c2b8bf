import { escape, layout } from "../shared/look";
import type { StoredMail } from "./store";

const frame = (title: string, main: string) =>
  layout({ title, name: "Local inbox", what: "Mail sent on this machine ends here. Nothing is delivered to anybody.", main });

const when = (iso: string) => `<time datetime="${iso}">${iso.slice(0, 16).replace("T", " ")} UTC</time>`;

const size = (bytes: number) => (bytes < 1024 ? `${bytes} B` : `${Math.ceil(bytes / 1024)} kB`);

export function listPage(mails: readonly StoredMail[]): string {
  const rows = mails.map((m) => `<tr><td><a href="/messages/${m.id}">${escape(m.subject || "(no subject)")}</a></td><td>${escape(m.to.join(", "))}</td>
<td>${escape(m.from)}</td><td>${m.attachments.length > 0 ? `${m.attachments.length} file${m.attachments.length > 1 ? "s" : ""}` : ""}</td><td>${when(m.receivedAt)}</td></tr>`).join("");
  const table = `<div class="scroll" tabindex="0" role="region" aria-label="Messages"><table><thead><tr><th scope="col">Subject</th><th scope="col">To</th><th scope="col">From</th><th scope="col">Attached</th><th scope="col">Arrived</th></tr></thead><tbody>${rows}</tbody></table></div>
<form method="post" action="/clear" style="margin-top:24px"><button class="second">Empty the inbox</button></form>`;
  return frame("Local inbox", `<h1>Messages (${mails.length})</h1><p><a href="/">Look again</a></p>${mails.length > 0 ? table : '<p class="note">No mail has arrived yet.</p>'}`);
}

/** Addresses in plain text become links. */
function linked(text: string): string {
  return text.split(/(https?:\/\/[^\s<>"]+[^\s<>".,;:!?)\]])/).map((part, i) => (i % 2 === 1 ? `<a href="${escape(part)}">${escape(part)}</a>` : escape(part))).join("");
}

export function mailPage(m: StoredMail): string {
  const files = m.attachments.map((a, i) => `<li><a href="/messages/${m.id}/attachments/${i}">${escape(a.name)}</a> (${escape(a.mime)}, ${size(a.size)})</li>`).join("");
  return frame(m.subject || "(no subject)", `<p><a href="/">All messages</a></p><h1>${escape(m.subject || "(no subject)")}</h1>
<dl><dt>From</dt><dd>${escape(m.from)}</dd><dt>To</dt><dd>${escape(m.to.join(", "))}</dd><dt>Arrived</dt><dd>${when(m.receivedAt)}</dd><dt>Message-ID</dt><dd>${escape(m.messageId)}</dd></dl>
${files ? `<h2>Attached</h2><ul>${files}</ul>` : ""}
${m.html === null ? "" : `<h2>As HTML</h2><iframe title="Message as HTML" src="/messages/${m.id}/html" sandbox="allow-popups allow-popups-to-escape-sandbox allow-top-navigation-by-user-activation"></iframe>`}
<h2>As text</h2><pre>${linked(m.text)}</pre><p><a href="/messages/${m.id}/raw">Whole message as it came</a></p>`);
}

/** The HTML part, its links opening in the whole window. Scripts and outside pictures stay off. */
export const htmlPart = (html: string): string => `<base target="_top">${html}`;
