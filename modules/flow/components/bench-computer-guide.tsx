import { Bay } from "@/modules/ui/bay";
import { CopyKey } from "@/modules/ui/copy-key";
import { benchExamples, type ExampleFacts } from "../domain/bench-examples";

/** How a bench computer writes readings by itself: commands to copy, with this shop's address and ids in them. */
export function BenchComputerGuide({ facts, documentHref }: { facts: ExampleFacts; documentHref: string }) {
  return (
    <Bay label="What a bench computer sends">
      <p className="mid mb-4 max-w-[72ch]">
        Add the computer above and copy its token into <code className="q">BENCH_TOKEN</code> there. It goes along as <code className="q">Authorization: Bearer</code>; no sign-in and no cookie is needed.
        Every POST carries a new UUID as <code className="q">Idempotency-Key</code>; sent again under the same one, it is done once and answered the same. Numbers are texts as read, with point or comma.
        A doubtful value is refused with its reason and <code className="q">data.askReason</code>: send it again under a new key with <code className="q">acceptedReason</code>. 401: the token is unknown or out of use. 503: wait the seconds of <code className="q">Retry-After</code>.
      </p>
      <ol className="grid gap-5">
        {benchExamples(facts).map((e) => (
          <li key={e.title} className="min-w-0">
            <h3 className="b">{e.title}</h3>
            <p className="mid mb-2">{e.words}</p>
            <pre className="q sm overflow-x-auto rounded-bay bg-well p-3" tabIndex={0} role="region" aria-label={`Command: ${e.title}`}>{e.command}</pre>
            <p className="mt-2"><CopyKey text={e.command} what={`the command for: ${e.title.toLowerCase()}`} /></p>
          </li>
        ))}
      </ol>
      <p className="hint mt-4">Every address and field stands in <a className="lk" href={documentHref}>the API&apos;s document</a> (OpenAPI 3.1).</p>
    </Bay>
  );
}
