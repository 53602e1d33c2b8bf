import { handle } from "@/modules/access/api";
import { saveMeasurementsEndpoint } from "@/modules/flow/endpoints";

export const POST = handle(saveMeasurementsEndpoint);
