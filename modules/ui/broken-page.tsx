"use client";
import { Button } from "./button";
import { ErrorState } from "./empty-state";

/** A page that broke: what happened, what is safe, one way on. `digest` leads to the entry in the log. */
export function BrokenPage({ error, retry }: { error: Error & { digest?: string }; retry: () => void }) {
  return (
    <main id="main" className="page">
      <h1 className="sr-only">Something broke</h1>
      <ErrorState title="This page broke on our side" {...(error.digest ? { reference: error.digest } : {})} action={<Button variant="go" onClick={retry}>Try again</Button>}>
        Nothing that was saved is lost. Try again; if it stays, give the reference to whoever looks after the installation.
      </ErrorState>
    </main>
  );
}
