import { handle } from "@/modules/access/api";
import { postTestEndpoint } from "@/modules/flow/endpoints";

export const POST = handle(postTestEndpoint);
