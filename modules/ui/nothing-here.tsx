import { EmptyState } from "./empty-state";
import { LinkButton } from "./button";

/** An address that leads nowhere, is somebody else's, or is not for this role: all look alike. */
export function NothingHere({ home }: { home: string }) {
  return (
    <main id="main" className="page">
      <h1 className="sr-only">Not found</h1>
      <EmptyState title="There is nothing at this address" action={<LinkButton href={home} variant="go">Back to the floor</LinkButton>}>
        It may have been moved, or your role does not reach it.
      </EmptyState>
    </main>
  );
}
