import { handle } from "@/modules/access/api";
import { flowSheetEndpoint } from "@/modules/flow/endpoints";

export const GET = handle(flowSheetEndpoint);
