import { handle } from "@/modules/access/api";
import { peopleAtEndpoint } from "@/modules/time/endpoints";

export const GET = handle(peopleAtEndpoint);
