import { handle } from "@/modules/access/api";
import { openWorkOrdersEndpoint } from "@/modules/purchasing/endpoints";

export const GET = handle(openWorkOrdersEndpoint);
