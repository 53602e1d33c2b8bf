import { handle } from "@/modules/access/api";
import { findCustomersEndpoint } from "@/modules/customers/endpoints";

export const GET = handle(findCustomersEndpoint);
