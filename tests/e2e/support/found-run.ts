import { foundForJourneys, foundWithWork } from "./found";

/** Prints what it founded, for the journey that asked. */
const [, , slug = "", kind = "empty"] = process.argv;
const found = kind === "work" ? foundWithWork : foundForJourneys;
console.log(`FOUNDED ${JSON.stringify(await found(process.env.VK_OWNER_URL ?? "", process.env.VK_PIN_PEPPER ?? "", slug))}`);
process.exit(0);
