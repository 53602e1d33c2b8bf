import { handle } from "@/modules/access/api";
import { pressEndpoint } from "@/modules/work-orders/bench-endpoints";

export const POST = handle(pressEndpoint);
