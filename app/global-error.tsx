"use client";
import { RECORDS_AWAY } from "@/modules/kernel/away";

/** The last net: the layout itself broke, so nothing of the kit can be relied on. */
export default function GlobalError({ error, retry }: { error: Error & { digest?: string }; retry: () => void }) {
  const isAway = error.digest === RECORDS_AWAY;
  return (
    <html lang="en">
      <body style={{ background: "#DDE6E0", color: "#101715", font: "16px/1.5 Arial, sans-serif", padding: 32 }}>
        <h1>{isAway ? "The shop’s data cannot be reached just now" : "Valvekeeper broke on our side"}</h1>
        <p>Nothing that was saved is lost.{isAway || error.digest === undefined ? "" : ` Reference ${error.digest}.`}</p>
        <button type="button" onClick={retry}>Try again</button>
      </body>
    </html>
  );
}
