"use client";
import { RECORDS_AWAY } from "@/modules/kernel/away";
import { Button } from "./button";
import { ErrorState } from "./empty-state";

/**
 * A page that broke: what happened, what is safe, one way on. A page whose data is away only for now says so; of any other
 * fault `digest` leads to the entry in the log. `retry` asks the server again.
 */
export function BrokenPage({ error, retry }: { error: Error & { digest?: string }; retry: () => void }) {
  const again = <Button variant="go" onClick={retry}>Try again</Button>;
  if (error.digest === RECORDS_AWAY) {
    return (
      <main id="main" className="page">
        <h1 className="sr-only">The shop&rsquo;s data cannot be reached</h1>
        <ErrorState title="The shop’s data cannot be reached just now" action={again}>What you typed is kept. Try again.</ErrorState>
      </main>
    );
  }
  return (
    <main id="main" className="page">
      <h1 className="sr-only">Something broke</h1>
      <ErrorState title="This page broke on our side" {...(error.digest ? { reference: error.digest } : {})} action={again}>
        Nothing that was saved is lost. Try again; if it stays, give the reference to whoever looks after the installation.
      </ErrorState>
    </main>
  );
}
