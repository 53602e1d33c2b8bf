import { handle } from "@/modules/access/api";
import { addPartEndpoint } from "@/modules/stock/write-endpoints";

export const POST = handle(addPartEndpoint);
