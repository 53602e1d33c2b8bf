import { z } from "zod";

// Zod compiles validators with new Function(); a strict content security policy reports that as an eval violation.
z.config({ jitless: true });

export { z };
