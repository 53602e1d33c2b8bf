import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { RECORDS_AWAY } from "@/modules/kernel/away";
import { BrokenPage } from "./broken-page";

/** As the browser gets an error of the server's page: no words, and the digest alone. */
const asSent = (digest?: string): Error & { digest?: string } => Object.assign(new Error("An error occurred in the Server Components render."), digest === undefined ? {} : { digest });
const shown = (error: Error & { digest?: string }): string => renderToStaticMarkup(<BrokenPage error={error} retry={() => undefined} />);

describe("a page that broke", () => {
  it("says that the shop's data is away when that is all", () => {
    const html = shown(asSent(RECORDS_AWAY));
    expect(html).toContain("The shop’s data cannot be reached just now");
    expect(html).toContain("What you typed is kept. Try again.");
    expect(html).not.toContain("Reference");
    expect(html).not.toContain("broke on our side");
    expect(html).toContain("<span>Try again</span>");
  });
  it("gives the reference of any other fault", () => {
    const html = shown(asSent("3141592653"));
    expect(html).toContain("This page broke on our side");
    expect(html).toContain("Reference 3141592653");
  });
});
