import { handle } from "@/modules/access/api";
import { needPartEndpoint } from "@/modules/work-orders/write-endpoints";

export const POST = handle(needPartEndpoint);
