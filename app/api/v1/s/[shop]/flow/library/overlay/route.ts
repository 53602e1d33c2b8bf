import { handle } from "@/modules/access/api";
import { overlayEndpoint } from "@/modules/flow/library-endpoints";

export const GET = handle(overlayEndpoint);
