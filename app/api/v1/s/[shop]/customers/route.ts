import { handle } from "@/modules/access/api";
import { findCustomersEndpoint } from "@/modules/customers/endpoints";
import { addCustomerEndpoint } from "@/modules/customers/write-endpoints";

export const GET = handle(findCustomersEndpoint);
export const POST = handle(addCustomerEndpoint);
