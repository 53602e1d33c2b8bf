import { handle } from "@/modules/access/api";
import { workingsEndpoint } from "@/modules/flow/workings-endpoints";

export const GET = handle(workingsEndpoint);
