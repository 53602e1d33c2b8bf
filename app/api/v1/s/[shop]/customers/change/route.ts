import { handle } from "@/modules/access/api";
import { changeCustomerEndpoint } from "@/modules/customers/write-endpoints";

export const POST = handle(changeCustomerEndpoint);
