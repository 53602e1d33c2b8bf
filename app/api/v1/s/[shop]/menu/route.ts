import { handle } from "@/modules/access/api";
import { menuEndpoint } from "@/modules/work-orders/endpoints";

export const GET = handle(menuEndpoint);
