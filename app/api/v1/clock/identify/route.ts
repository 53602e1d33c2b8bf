import { handle } from "@/modules/access/api";
import { identifyEndpoint } from "@/modules/work-orders/bench-endpoints";

export const POST = handle(identifyEndpoint);
