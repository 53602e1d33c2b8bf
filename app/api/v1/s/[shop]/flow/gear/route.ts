import { handle } from "@/modules/access/api";
import { flowGearEndpoint } from "@/modules/flow/endpoints";

export const GET = handle(flowGearEndpoint);
