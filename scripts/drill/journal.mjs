/** What was sent and what came back, on disk before anything else happens: it must survive whatever the drill kills. */
import fs from "node:fs";
import path from "node:path";

export function openJournal(file) {
  fs.mkdirSync(path.dirname(file), { recursive: true });
  const fd = fs.openSync(file, "w");
  const write = (row) => {
    fs.writeSync(fd, `${JSON.stringify(row)}\n`);
    fs.fsyncSync(fd);
  };
  return {
    file,
    /** Before the first send of an act. */
    intend: (act) => write({ at: Date.now(), key: act.key, shop: act.shop, kind: act.kind, command: act.command, path: act.path, body: act.body }),
    /** After each answer, or the lack of one. */
    answered: (key, outcome) => write({ at: Date.now(), key, ...outcome }),
    close: () => fs.closeSync(fd),
  };
}

/** The journal as acts with everything that came back for each. */
export function readJournal(file) {
  const acts = new Map();
  for (const line of fs.readFileSync(file, "utf8").split("\n").filter(Boolean)) {
    const row = JSON.parse(line);
    if (row.path !== undefined) acts.set(row.key, { ...row, outcomes: [] });
    else acts.get(row.key).outcomes.push(row);
  }
  return [...acts.values()];
}

/** `acknowledged` with the reply, `refused`, or `unknown`: nothing definite ever came back. */
export function verdictOf(act) {
  const done = act.outcomes.filter((o) => o.status >= 200 && o.status < 300);
  if (done.length > 0) return { verdict: "acknowledged", reply: done[0].reply, replies: done.map((o) => o.reply) };
  if (act.outcomes.some((o) => o.status >= 400 && o.status < 500)) return { verdict: "refused" };
  return { verdict: "unknown" };
}
