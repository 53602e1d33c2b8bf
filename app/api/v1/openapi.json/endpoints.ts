import * as customers from "@/modules/customers/endpoints";

/** Every address of the API, for its document. A test holds this list against the route files. */
export const ENDPOINTS = [customers].flatMap((module) => Object.values(module));
