import { handle } from "@/modules/access/api";
import { takePaymentEndpoint } from "@/modules/payments/write-endpoints";

export const POST = handle(takePaymentEndpoint);
