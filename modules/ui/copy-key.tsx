"use client";

import { useState } from "react";
import { Button } from "./button";

/** Copies a text. Says when it did; where the browser will not, says to mark and copy it by hand. */
export function CopyKey({ text, what }: { text: string; what: string }) {
  const [said, setSaid] = useState<"" | "Copied" | "Mark it and copy it by hand">("");
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(text);
      setSaid("Copied");
    } catch {
      setSaid("Mark it and copy it by hand");
    }
  };
  return (
    <span className="inline-flex items-center gap-2">
      <Button size="sm" onClick={() => void copy()} aria-label={`Copy ${what}`}>Copy</Button>
      <span role="status" className="dim sm">{said}</span>
    </span>
  );
}
