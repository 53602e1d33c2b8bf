import { handle } from "@/modules/access/api";
import { ledgerEndpoint } from "@/modules/stock/endpoints";

export const GET = handle(ledgerEndpoint);
