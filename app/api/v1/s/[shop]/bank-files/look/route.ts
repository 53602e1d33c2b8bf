import { handle } from "@/modules/access/api";
import { lookAtBankFileEndpoint } from "@/modules/payments/endpoints";

export const POST = handle(lookAtBankFileEndpoint);
