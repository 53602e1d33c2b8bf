import { handle } from "@/modules/access/api";
import { libraryEndpoint } from "@/modules/flow/library-endpoints";

export const GET = handle(libraryEndpoint);
