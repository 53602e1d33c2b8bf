import { foundForJourneys } from "./found";

/** Prints what it founded, for the journey that asked. */
console.log(`FOUNDED ${JSON.stringify(await foundForJourneys(process.env.VK_OWNER_URL ?? "", process.env.VK_PIN_PEPPER ?? "", process.argv[2] ?? ""))}`);
process.exit(0);
