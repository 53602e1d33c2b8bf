import { index, pgTable, primaryKey, text, integer, foreignKey, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, minorUnits, shopId, version } from "./columns";
import { shops } from "./shops";

export const customers = pgTable("customers", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  kind: text("kind").notNull().default("person"),
  name: text("name").notNull(),
  /** Lower-case copies for look-up; kept by the command. */
  nameKey: text("name_key").notNull(),
  email: text("email"),
  phone: text("phone"),
  phoneDigits: text("phone_digits").notNull().default(""),
  address: text("address").notNull().default(""),
  terms: text("terms").notNull().default("receipt"),
  laborDiscountBasisPoints: integer("labor_discount_basis_points").notNull().default(0),
  creditLimitMinor: minorUnits("credit_limit_minor"),
  taxNumber: text("tax_number").notNull().default(""),
  notes: text("notes").notNull().default(""),
  mailProblem: text("mail_problem"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), index("customers_name").on(t.shopId, t.nameKey), index("customers_phone").on(t.shopId, t.phoneDigits)]);

export const taxCertificates = pgTable("tax_certificates", {
  shopId: shopId(),
  id: id(),
  customerId: uuid("customer_id").notNull(),
  kind: text("kind").notNull(),
  number: text("number").notNull(),
  jurisdiction: text("jurisdiction").notNull(),
  validFrom: businessDate("valid_from").notNull(),
  validTo: businessDate("valid_to").notNull(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
]);
