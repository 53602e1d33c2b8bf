import { handle } from "@/modules/access/api";
import { findOperationsEndpoint } from "@/modules/time/endpoints";

export const GET = handle(findOperationsEndpoint);
