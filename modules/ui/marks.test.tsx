import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { Dial, dialNames } from "./dial";
import { Flag } from "./flag";
import { Icon, iconNames } from "./icon";
import { LineStrip } from "./line-strip";
import { Note } from "./note";
import { Status } from "./status";
import { Tag } from "./tag";
import { Tube } from "./tube";

const html = renderToStaticMarkup;

describe("drawings", () => {
  it("are hidden from screen readers, all of them", () => {
    for (const name of iconNames) expect(html(<Icon name={name} />)).toContain('aria-hidden="true"');
    for (const name of dialNames) expect(html(<Dial name={name} />)).toContain('aria-hidden="true"');
  });
  it("every dial has a shape of its own", () => {
    expect(new Set(dialNames.map((name) => html(<Dial name={name} />))).size).toBe(dialNames.length);
  });
});

describe("marks say in words what they show", () => {
  it("status keeps its word", () => expect(html(<Status dial="work">In work</Status>)).toContain("In work"));
  it("a running tag says so", () => {
    expect(html(<Tag running>2418-A</Tag>)).toContain("running");
    expect(html(<Tag>2418-B</Tag>)).not.toContain("running");
  });
  it("a failed flag always carries the triangle", () => {
    expect(html(<Flag tone="failed">Failed</Flag>)).toContain("<svg");
    expect(html(<Flag tone="failed" icon="check">Failed</Flag>)).toBe(html(<Flag tone="failed">Failed</Flag>));
  });
  it("a tube with words is an image of them, without is hidden, as progress counts", () => {
    expect(html(<Tube value={5.7} mark={8} label="5.7 of 8 hours" />)).toMatch(/role="img" aria-label="5.7 of 8 hours"/);
    expect(html(<Tube value={5.7} mark={8} />)).toContain('aria-hidden="true"');
    expect(html(<Tube value={38} mark={52} progress label="Reading" />)).toMatch(/role="progressbar".*aria-valuenow="38" aria-valuemax="52"/);
  });
  it("a tube past its mark is hatched", () => {
    expect(html(<Tube value={2.6} mark={2} />)).toContain("<u>");
    expect(html(<Tube value={2} mark={2} />)).not.toContain("<u>");
  });
  it("notes that come later are announced, a stop at once", () => {
    expect(html(<Note live tone="stop">No.</Note>)).toContain('role="alert"');
    expect(html(<Note live tone="warn">Mind.</Note>)).toContain('role="status"');
    expect(html(<Note tone="stop">No.</Note>)).not.toContain("role=");
  });
});

describe("the line", () => {
  const stations = ["In", "Strip", "Port"].map((label) => ({ key: label, label }));
  const classes = (now: number) => [...html(<LineStrip label="Where" stations={stations} now={now} />).matchAll(/<li class="([a-z]*)"/g)].map((m) => m[1]);
  it("fills to the current station", () => expect(classes(1)).toEqual(["done", "now", ""]));
  it("is empty before and full after", () => {
    expect(classes(-1)).toEqual(["", "", ""]);
    expect(classes(3)).toEqual(["done", "done", "done"]);
  });
  it("names the current station to a screen reader", () => {
    expect(html(<LineStrip label="Where" stations={stations} now={1} />)).toMatch(/aria-current="step"><b>Strip/);
  });
});
