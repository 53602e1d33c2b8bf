import * as customers from "@/modules/customers/endpoints";
import * as flow from "@/modules/flow/endpoints";
import * as flowLibrary from "@/modules/flow/library-endpoints";

/** Every address of the API, for its document. A test holds this list against the route files. */
export const ENDPOINTS = [customers, flow, flowLibrary].flatMap((module) => Object.values(module));
