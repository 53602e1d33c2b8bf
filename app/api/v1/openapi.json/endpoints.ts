import type { Endpoint } from "@/modules/access/api";
import type { z } from "@/modules/kernel/zod";
import * as customers from "@/modules/customers/endpoints";
import * as customerWrites from "@/modules/customers/write-endpoints";
import * as flow from "@/modules/flow/endpoints";
import * as flowLibrary from "@/modules/flow/library-endpoints";
import * as flowWorkings from "@/modules/flow/workings-endpoints";
import * as invoices from "@/modules/invoices/endpoints";
import * as payments from "@/modules/payments/endpoints";
import * as paymentWrites from "@/modules/payments/write-endpoints";
import * as purchasing from "@/modules/purchasing/endpoints";
import * as purchaseWrites from "@/modules/purchasing/write-endpoints";
import * as stock from "@/modules/stock/endpoints";
import * as stockWrites from "@/modules/stock/write-endpoints";
import * as time from "@/modules/time/endpoints";
import * as bench from "@/modules/work-orders/bench-endpoints";
import * as workOrders from "@/modules/work-orders/endpoints";
import * as workOrderWrites from "@/modules/work-orders/write-endpoints";

type AnyEndpoint = Endpoint<z.ZodType, unknown>;
const isEndpoint = (value: unknown): value is AnyEndpoint => typeof value === "object" && value !== null && "method" in value && "path" in value;

/** Every address of the API, for its document. A test holds this list against the route files. */
export const ENDPOINTS: readonly AnyEndpoint[] = [
  customers, customerWrites, flow, flowLibrary, flowWorkings, invoices, payments, paymentWrites, purchasing, purchaseWrites, stock, stockWrites, time, bench, workOrders, workOrderWrites,
].flatMap((module) => Object.values(module).filter(isEndpoint));
