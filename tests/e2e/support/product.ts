/** The product under test, as whoever started it (scripts/test.mjs) names it. */
const named = (name: string): string => {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set: run the journeys with \`npm test -- --only journeys\`.`);
  return value;
};

export const product = {
  get app() { return named("E2E_BASE_URL"); },
  get inbox() { return named("E2E_INBOX_URL"); },
  get payments() { return named("E2E_PAY_URL"); },
  get clockFile() { return named("E2E_CLOCK_FILE"); },
};
