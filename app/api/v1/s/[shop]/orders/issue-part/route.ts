import { handle } from "@/modules/access/api";
import { issuePartEndpoint } from "@/modules/work-orders/write-endpoints";

export const POST = handle(issuePartEndpoint);
