"use client";

/** The last net: the layout itself broke, so nothing of the kit can be relied on. */
export default function GlobalError({ reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en">
      <body style={{ background: "#DDE6E0", color: "#101715", font: "16px/1.5 Arial, sans-serif", padding: 32 }}>
        <h1>Valvekeeper broke on our side</h1>
        <p>Nothing that was saved is lost.</p>
        <button type="button" onClick={reset}>Try again</button>
      </body>
    </html>
  );
}
