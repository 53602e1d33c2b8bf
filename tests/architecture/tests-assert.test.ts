import ts from "typescript";
import { describe, expect, it } from "vitest";
import { sources, textOf } from "./sources";

const files = ["modules", "tests", "db", "seed", "worker", "scripts", "app"].flatMap((f) => sources(f, /\.(test|spec)\.tsx?$/));

/** Tests whose body never reaches an expect, and tests that are focused or left out. */
function faultsOf(file: string): string[] {
  const source = ts.createSourceFile(file, textOf(file), ts.ScriptTarget.Latest, true);
  const faults: string[] = [];
  // Helpers of the file that assert for their caller.
  const asserting = new Set<string>();
  for (const s of source.statements) {
    const named = ts.isFunctionDeclaration(s) ? [s] : ts.isVariableStatement(s) ? s.declarationList.declarations.filter((d) => d.initializer && ts.isArrowFunction(d.initializer)) : [];
    for (const n of named) if (n.name && /\bexpect\(/.test(n.getText(source))) asserting.add(n.name.getText(source));
  }
  const visit = (node: ts.Node): void => {
    if (ts.isCallExpression(node)) {
      const callee = node.expression.getText(source);
      if (/^(it|test|describe)\.(only|skip|todo|fixme)\b/.test(callee)) faults.push(`${callee} at ${file}`);
      if (/^(it|test)(\.each\b.*|)$/s.test(callee) && node.arguments.length >= 2) {
        const body = node.arguments.find((a) => ts.isArrowFunction(a) || ts.isFunctionExpression(a));
        const text = body?.getText(source) ?? "";
        if (body && !/\b(expect|fc\.assert)\s*(\.\w+)*\(/.test(text) && ![...asserting].some((name) => text.includes(`${name}(`))) faults.push(`no assertion: ${node.arguments[0]?.getText(source) ?? ""} in ${file}`);
      }
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return faults;
}

describe("tests", () => {
  it("are found", () => expect(files.length).toBeGreaterThan(10));
  it.each(files)("%s asserts something in each test and leaves none out", (file) => expect(faultsOf(file)).toEqual([]));
});
