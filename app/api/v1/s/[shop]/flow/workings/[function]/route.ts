import { handle } from "@/modules/access/api";
import { runWorkingEndpoint } from "@/modules/flow/workings-endpoints";

export const POST = handle(runWorkingEndpoint);
