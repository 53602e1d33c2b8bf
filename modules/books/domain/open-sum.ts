import { minor, type Minor } from "@/modules/kernel/money";

export interface InvoiceSums {
  readonly totalMinor: number;
  readonly depositAppliedMinor: number;
  readonly paidMinor: number;
  readonly creditedMinor: number;
}

/** What is still to pay of an issued invoice: total less deposit, payments (and write-offs) and credit notes. */
export const openOf = (i: InvoiceSums): Minor => minor(i.totalMinor - i.depositAppliedMinor - i.paidMinor - i.creditedMinor);
