import { mainOf, type Crew } from "../support/crew";

/** The floor as the owner sees it. */
export async function floor(crew: Crew): Promise<string> {
  const page = await crew.as("Marit");
  await page.goto(crew.at(""));
  return mainOf(page);
}

/** Profit of a job with every part opened. */
export async function profit(crew: Crew, order: string): Promise<string> {
  const page = await crew.as("Marit");
  await page.goto(crew.at(`/orders/${order}`));
  const bay = page.getByRole("region", { name: "Profit of this job" });
  await bay.locator("summary").first().waitFor();
  for (const part of await bay.locator("summary").all()) await part.click();
  return (await bay.innerText()).replace(/\s+/g, " ");
}
