/** What PostgreSQL said, without its words: SQLSTATE and the constraint, found through the driver's wrapping. */
function databaseFault(error: unknown): { state: string; constraint: string } | null {
  let e: unknown = error;
  for (let depth = 0; depth < 4 && e instanceof Error; depth++) {
    const { code, constraint } = e as { code?: unknown; constraint?: unknown };
    if (typeof code === "string" && /^[0-9A-Z]{5}$/.test(code)) return { state: code, constraint: typeof constraint === "string" ? constraint : "" };
    e = e.cause;
  }
  return null;
}

/** The same transaction may well pass if tried again: serialisation failure, deadlock. */
export const isRetryable = (error: unknown): boolean => ["40001", "40P01"].includes(databaseFault(error)?.state ?? "");

/** Constraints that are rules of the shop, with the refusal a person can act on. */
const RULES: Record<string, { code: string; message: string; field?: string }> = {
  stock_not_below_zero: { code: "INSUFFICIENT_STOCK", message: "There is not that much on the shelf. Count it or take in more first." },
  lot_not_below_zero: { code: "INSUFFICIENT_STOCK", message: "There is not that much left of this lot." },
  time_no_overlap: { code: "TIME_OVERLAPS", message: "This time overlaps another entry of the same person. Correct that one first." },
  time_one_open: { code: "ALREADY_RUNNING", message: "A clock is already running for this person. Stop it or switch." },
  parts_sku: { code: "SKU_TAKEN", message: "That part number is in use already. A number is never used twice.", field: "sku" },
  suppliers_name: { code: "NAME_TAKEN", message: "There is a supplier of that name already.", field: "name" },
  menu_operations_code: { code: "CODE_TAKEN", message: "That code is in use on the menu.", field: "code" },
  people_badge: { code: "BADGE_TAKEN", message: "That badge belongs to somebody else in this shop.", field: "badgeCode" },
  benches_name: { code: "NAME_TAKEN", message: "There is a bench of that name already.", field: "name" },
  fixtures_name: { code: "NAME_TAKEN", message: "There is a fixture of that name already.", field: "name" },
  lift_devices_name: { code: "NAME_TAKEN", message: "There is a lift device of that name already.", field: "name" },
  check_plates_serial: { code: "SERIAL_TAKEN", message: "There is a check plate with that serial already.", field: "serial" },
  camshafts_label: { code: "NAME_TAKEN", message: "There is a camshaft of that label and side already.", field: "label" },
  engine_families_name: { code: "NAME_TAKEN", message: "There is a family of that name already.", field: "name" },
  approvals_one_answer: { code: "ALREADY_ANSWERED", message: "This estimate has been answered already." },
  bank_files_once: { code: "FILE_KNOWN", message: "This very file was read in before. Nothing was added." },
  movement_reversed_once: { code: "ALREADY_REVERSED", message: "This movement was reversed already." },
  flow_readings_cell: { code: "CHANGED_MEANWHILE", message: "Somebody else wrote this cell at the same moment. Look at it and type again." },
  bench_check_struck_once: { code: "ALREADY_STRUCK", message: "This check is out of use already." },
  cautions_once: { code: "ALREADY_SEEN", message: "You have confirmed this caution for this job already." },
};

export const ruleOf = (error: unknown): { code: string; message: string; field?: string } | null => {
  const fault = databaseFault(error);
  return fault ? (RULES[fault.constraint] ?? null) : null;
};
