import { closeDatabase } from "@/db/client";
import { foundWithOwner, NotFounded, ownersLink } from "./found";

const asked = JSON.parse(process.env.FOUND_SHOP ?? "{}") as { again?: string };
const ownerUrl = process.env.VK_OWNER_URL ?? "";
try {
  const { slug, address, until } = asked.again ? await ownersLink(ownerUrl, asked.again, new Date()) : await foundWithOwner(ownerUrl, process.env.VK_PIN_PEPPER ?? "", asked, new Date());
  console.log(`The shop "${slug}" is there. Its owner sets a password at this address, once, until ${until}:\n\n  ${address}\n`);
} catch (error) {
  if (!(error instanceof NotFounded)) throw error;
  console.error(error.message);
  process.exitCode = 1;
}
await closeDatabase();
