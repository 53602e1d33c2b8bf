/** What the examples are filled in with. */
export interface ExampleFacts {
  /** Address of this installation, without a slash at its end. */
  readonly origin: string;
  readonly slug: string;
  readonly benchId: string;
  readonly fixtureId: string;
  readonly operatorId: string;
  /** Of a head that is here. */
  readonly tag: string;
  /** Of an open test. */
  readonly testId: string;
}
export interface BenchExample { readonly title: string; readonly words: string; readonly command: string }

/** A text within single quotes of a shell. */
const quoted = (text: string): string => `'${text.replaceAll("'", "'\\''")}'`;

/** Commands that a bench computer can run as they stand, once its token is in `BENCH_TOKEN`. */
export function benchExamples(f: ExampleFacts): BenchExample[] {
  const at = `${f.origin}/api/v1/s/${f.slug}/flow`;
  const token = '-H "Authorization: Bearer $BENCH_TOKEN"';
  const get = (path: string) => `curl -sS ${token} ${quoted(`${at}${path}`)}`;
  const post = (path: string, body: object) => `curl -sS -X POST ${quoted(`${at}${path}`)} \\\n  ${token} \\\n  -H "Idempotency-Key: $(uuidgen | tr A-Z a-z)" \\\n  -H "Content-Type: application/json" \\\n  -d ${quoted(JSON.stringify(body))}`;
  return [
    { title: "Ids of benches, bore adapters and people", words: "Asked once: a whole test names them.", command: get("/gear") },
    { title: "The sheet of a head", words: "By its tag. Its tests stand under tests, each with its id, side and state; a reading goes into one whose state is draft.", command: get(`/sheet?tag=${encodeURIComponent(f.tag).replaceAll("'", "%27")}`) },
    {
      title: "One reading", words: "Into an open test. revisionSeen is the revision of the cell you last saw, 0 for an empty one. pressure is what was held; left out, the test's own.",
      command: post("/readings", { testId: f.testId, lift: "0.100", liftUnit: "in", value: "48.9", pressure: "28.1", revisionSeen: 0 }),
    },
    {
      title: "A whole test", words: "By the tag of the head, kept whole or not at all. A lift sent twice is a repeat. With complete it is finished and frozen.",
      command: post("/tests", {
        tag: f.tag, side: "exhaust", purpose: "baseline", benchId: f.benchId, fixtureId: f.fixtureId, operatorId: f.operatorId, nominal: "28", liftUnit: "in", valve: "26.5",
        readings: [["0.050", "20.1"], ["0.100", "39.4"], ["0.150", "57.2"], ["0.200", "71.8"]].map(([lift, value]) => ({ lift, value })), complete: true,
      }),
    },
  ];
}
