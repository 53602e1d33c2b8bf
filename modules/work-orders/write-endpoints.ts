import "server-only";
import { commandEndpoint } from "@/modules/access/api";
import { openOrder } from "./commands/open-order";
import { issueToWorkOrder, needPart } from "./commands/parts";

export const openOrderEndpoint = commandEndpoint(openOrder, { path: "/api/v1/s/{shop}/orders/open", summary: "A new work order with its pieces" });
export const needPartEndpoint = commandEndpoint(needPart, { path: "/api/v1/s/{shop}/orders/need-part", summary: "A part that a work order needs beyond its estimate" });
export const issuePartEndpoint = commandEndpoint(issueToWorkOrder, { path: "/api/v1/s/{shop}/orders/issue-part", summary: "Parts from the shelf to a work order" });
