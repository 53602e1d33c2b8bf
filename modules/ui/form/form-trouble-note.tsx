"use client";

import type { ReactNode } from "react";
import { Button } from "../button";
import { Note } from "../note";
import type { Trouble } from "./form-trouble";

/** The note above a form that was not saved: what happened, what is safe, one way on. */
export function FormTrouble({
  trouble,
  onRetry,
  pending,
  signInHref,
  words,
}: {
  trouble: Trouble | null;
  onRetry: () => void;
  pending: boolean;
  signInHref: string;
  words?: (code: string, data: Record<string, string | number | boolean | null>) => ReactNode;
}) {
  if (trouble === null) return null;
  const again = (
    <Button size="sm" onClick={onRetry} pending={pending} pendingText="Trying…">
      Try again
    </Button>
  );
  switch (trouble.kind) {
    case "no-link":
      return (
        <Note live tone="stop" icon="unplug" title="Not saved: no link to the shop." action={again}>
          What you typed is still here.
        </Note>
      );
    case "signed-out":
      return (
        <Note live tone="stop" icon="lock" title="Not saved: you are signed out." action={again}>
          <a className="lk" href={signInHref} target="_blank" rel="noopener">
            Sign in<span className="sr-only"> (opens in a new tab)</span>
          </a>{" "}
          in a new tab, then try again here. What you typed is still here.
        </Note>
      );
    case "refused":
      return (
        <Note live tone="stop">
          {words?.(trouble.code, trouble.data) ?? trouble.message}
        </Note>
      );
    case "away":
      return (
        <Note live tone="stop" icon="unplug" title="Not saved yet." action={again}>
          {trouble.message}
        </Note>
      );
    case "conflict":
      return (
        <Note live tone="stop" title="Not saved: someone else changed this meanwhile.">
          {trouble.message} What you typed is still here.
        </Note>
      );
    case "error":
      return (
        <Note live tone="stop" title="Not saved: something went wrong on our side." action={again}>
          What you typed is still here. Reference {trouble.reference}.
        </Note>
      );
  }
}
