import "server-only";
import { commandEndpoint } from "@/modules/access/api";
import { takePayment } from "./commands";

export const takePaymentEndpoint = commandEndpoint(takePayment, { path: "/api/v1/s/{shop}/payments/take", summary: "Cash, a check or a transfer taken at the counter" });
