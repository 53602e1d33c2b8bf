import { describe, expect, it } from "vitest";
import { agree, Inputs, type Adapters, type CheckCase } from "@/tests/checks/check-case";
import checks from "@/tests/checks/flow.json";
import { BENCH_ADAPTERS } from "@/tests/checks/flow-bench";
import { CURVE_ADAPTERS } from "@/tests/checks/flow-curve";
import { HEAD_ADAPTERS } from "@/tests/checks/flow-head";

const RUN: Adapters = { ...BENCH_ADAPTERS, ...CURVE_ADAPTERS, ...HEAD_ADAPTERS };
const cases: readonly CheckCase[] = checks.cases;
let ran = 0;

describe("published and worked check cases of flow and head measurement", () => {
  it.each(cases.map((c) => [`${c.id} ${c.title} (${c.source})`, c] as const))("%s", (_, c) => {
    const run = RUN[c.function];
    if (!run) throw new Error(`no adapter for ${c.function}`);
    const inputs = new Inputs(c.inputs);
    const answer = run(inputs);
    expect(inputs.unread(), "every input of the case is used").toEqual([]);
    if ("error" in c.expected) {
      expect(answer.ok).toBe(false);
      expect(answer.ok ? null : answer.refusal.code).toBe(c.expected.error);
      expect(answer).not.toHaveProperty("value");
    } else {
      if (!answer.ok) throw new Error(`refused: ${answer.refusal.code}`);
      expect(Object.keys(c.expected).length).toBeGreaterThan(0);
      for (const [key, expected] of Object.entries(c.expected)) agree(answer.value[key], expected, c, key);
    }
    ran += 1;
  });

  it("ran all 64 cases, no id twice", () => {
    expect(new Set(cases.map((c) => c.id)).size).toBe(64);
    expect(ran).toBe(64);
  });
});
