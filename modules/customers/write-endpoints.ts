import "server-only";
import { commandEndpoint } from "@/modules/access/api";
import { addCustomer, changeCustomer } from "./commands";

export const addCustomerEndpoint = commandEndpoint(addCustomer, { path: "/api/v1/s/{shop}/customers", summary: "A new customer" });
export const changeCustomerEndpoint = commandEndpoint(changeCustomer, { path: "/api/v1/s/{shop}/customers/change", summary: "An edit of a customer, with the version it was made on" });
