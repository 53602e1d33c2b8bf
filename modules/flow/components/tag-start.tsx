import { Button } from "@/modules/ui/button";

/** Opens the sheet of a tag, typed or scanned. A plain form: works before anything is loaded. */
export function TagStart({ at, missing }: { at: string; missing: string }) {
  return (
    <form action={at} className="flex flex-wrap items-center gap-2" role="search">
      <span className="in" style={{ width: 190 }}>
        <input name="tag" aria-label="Tag of the head" placeholder="Tag" defaultValue={missing} required maxLength={40} autoComplete="off" aria-describedby={missing ? "tag-missing" : undefined} aria-invalid={missing ? true : undefined} />
      </span>
      <Button type="submit" variant="go" icon="tube">Open sheet</Button>
      {missing ? <span id="tag-missing" className="hint">No head carries {missing}. Look at the tag again, or find it below.</span> : null}
    </form>
  );
}
