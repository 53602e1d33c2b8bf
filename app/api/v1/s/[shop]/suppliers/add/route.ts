import { handle } from "@/modules/access/api";
import { addSupplierEndpoint } from "@/modules/purchasing/write-endpoints";

export const POST = handle(addSupplierEndpoint);
