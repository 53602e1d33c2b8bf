import { handle } from "@/modules/access/api";
import { familyPictureEndpoint } from "@/modules/flow/library-endpoints";

export const GET = handle(familyPictureEndpoint);
