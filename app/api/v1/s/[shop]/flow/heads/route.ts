import { handle } from "@/modules/access/api";
import { flowRoomEndpoint } from "@/modules/flow/endpoints";

export const GET = handle(flowRoomEndpoint);
