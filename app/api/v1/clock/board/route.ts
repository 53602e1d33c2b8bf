import { handle } from "@/modules/access/api";
import { clockBoardEndpoint } from "@/modules/work-orders/bench-endpoints";

export const GET = handle(clockBoardEndpoint);
