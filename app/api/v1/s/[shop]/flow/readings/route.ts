import { handle } from "@/modules/access/api";
import { recordReadingEndpoint } from "@/modules/flow/endpoints";

export const POST = handle(recordReadingEndpoint);
