import { describe, expect, it } from "vitest";
import { agree, type CheckCase } from "@/tests/checks/check-case";
import checks from "@/tests/checks/flow.json";
import { WORKINGS } from "../workings/registry";

const cases: readonly CheckCase[] = checks.cases;
let ran = 0;

/** The way a person and a program go too: by the name of the function and the names of its inputs. */
describe("published and worked check cases of flow and head measurement", () => {
  it.each(cases.map((c) => [`${c.id} ${c.title} (${c.source})`, c] as const))("%s", (_, c) => {
    const [found, ...others] = WORKINGS.filter((w) => w.name === c.function);
    if (!found) throw new Error(`no working called ${c.function}`);
    expect(others).toEqual([]);
    const answer = found.run(c.inputs);
    if ("error" in c.expected) {
      expect(answer.ok).toBe(false);
      expect(answer.ok ? null : answer.refusal.code).toBe(c.expected.error);
      expect(answer).not.toHaveProperty("value");
    } else {
      if (!answer.ok) throw new Error(`refused: ${answer.refusal.code} ${answer.refusal.message}`);
      expect(Object.keys(c.expected).length).toBeGreaterThan(0);
      const { values, flags } = answer.value;
      for (const [key, expected] of Object.entries(c.expected)) agree(key === "flags" ? flags : values[key], expected, c, key);
    }
    ran += 1;
  });

  it.each(cases.map((c) => [c.id, c] as const))("%s: every input of the case is asked for by the calculation", (_, c) => {
    const asked = new Set<PropertyKey>();
    const watched = new Proxy(c.inputs, { get: (target, key) => { asked.add(key); return Reflect.get(target, key) as unknown; } });
    const found = WORKINGS.find((w) => w.name === c.function);
    found?.compute(watched);
    expect(Object.keys(c.inputs).filter((key) => !asked.has(key))).toEqual([]);
  });

  it("ran all 64 cases, no id twice", () => {
    expect(new Set(cases.map((c) => c.id)).size).toBe(64);
    expect(ran).toBe(64);
  });
});
