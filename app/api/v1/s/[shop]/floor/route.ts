import { handle } from "@/modules/access/api";
import { floorEndpoint } from "@/modules/work-orders/endpoints";

export const GET = handle(floorEndpoint);
