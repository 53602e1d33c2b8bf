import { handle } from "@/modules/access/api";
import { findInvoicesEndpoint } from "@/modules/invoices/endpoints";

export const GET = handle(findInvoicesEndpoint);
