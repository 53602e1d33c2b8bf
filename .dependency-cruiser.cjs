// The laws of the house. Each message says what to do instead.
const ORDER = ["kernel", "ui", "access", "outbound", "documents", "customers", "books", "time", "flow", "stock", "purchasing", "work-orders", "invoices", "payments", "reports"];
// Neighbours on one step of the stair do not use each other; documents, the lowest feature, uses access and outbound.
const STEP = { kernel: 0, ui: 1, access: 2, outbound: 2, documents: 3, customers: 4, books: 4, time: 4, flow: 4, stock: 5, purchasing: 6, "work-orders": 7, invoices: 8, payments: 9, reports: 10 };
const TEST = "\\.(int\\.)?test\\.tsx?$";

const stairs = ORDER.map((name) => ({
  name: `stair-${name}`,
  comment: `${name} may use only what stands lower on the stair. Move the joint up, or pass what is needed as an argument.`,
  severity: "error",
  from: { path: `^modules/${name}/`, pathNot: TEST },
  to: { path: `^modules/(${ORDER.filter((o) => o !== name && STEP[o] >= STEP[name]).join("|") || "-none-"})/`, pathNot: "^modules/ui/form/reply\\.ts$" },
}));

module.exports = {
  forbidden: [
    ...stairs,
    { name: "known-module", comment: "Every module has its place on the stair: add it to ORDER and STEP.", severity: "error", from: {}, to: { path: "^modules/", pathNot: `^modules/(${ORDER.join("|")})/` } },
    { name: "domain-is-pure", comment: "Domain computes from its arguments. Bring what it needs as an argument; use kernel and lower domains only.", severity: "error",
      from: { path: "^modules/[^/]+/domain/", pathNot: TEST }, to: { pathNot: "^modules/(kernel/|[^/]+/domain/)" } },
    { name: "workings-are-pure", comment: "Workings run in the browser and on the server alike: domain and kernel only. Bring what the shop decides as an argument.", severity: "error",
      from: { path: "^modules/flow/workings/", pathNot: TEST }, to: { pathNot: "^modules/(kernel/|flow/(domain|workings)/)" } },
    { name: "kernel-knows-nothing", comment: "The kernel is vocabulary: it imports itself, dayjs and zod.", severity: "error",
      from: { path: "^modules/kernel/", pathNot: TEST }, to: { pathNot: "^(modules/kernel/|node_modules/(dayjs|zod)/)" } },
    { name: "db-knows-no-module", comment: "The database layer is a leaf. Rules go to a domain, joints to commands and queries.", severity: "error", from: { path: "^db/" }, to: { path: "^(modules|app|seed|tests|worker)/" } },
    { name: "ui-has-no-shop", comment: "The kit looks; it does not fetch shop facts. Pass them as props.", severity: "error", from: { path: "^modules/ui/" }, to: { path: "^(db|app|modules/(?!ui/|kernel/))" } },
    { name: "screens-ask-the-data-layer", comment: "Pages and components ask queries and actions; only those open the database.", severity: "error",
      from: { path: "^(app/|modules/[^/]+/components/)", pathNot: TEST }, to: { path: "^(db/|node_modules/(drizzle-orm|pg)/|modules/outbound/)" } },
    { name: "drizzle-behind-the-data-layer", comment: "Only db, commands, queries and the modules' server files speak to the database.", severity: "error",
      from: { pathNot: "^(db/|seed/|tests/|worker/|modules/[^/]+/(?!components/|domain/|input)[^/]+|scripts/)|drizzle\\.config" }, to: { path: "node_modules/(drizzle-orm|pg)/" } },
    { name: "providers-behind-ports", comment: "Stripe, SMTP, S3 and pictures go through modules/outbound.", severity: "error",
      from: { pathNot: "^(modules/outbound/|tests/)" }, to: { path: "node_modules/(stripe|nodemailer|@aws-sdk|sharp)/" } },
    { name: "pdfmake-behind-its-port", comment: "Documents are described with pdfmake's types only; rendering is modules/outbound/pdf.", severity: "error",
      from: { pathNot: "^(modules/outbound/pdf/|tests/)" }, to: { path: "node_modules/pdfmake/", dependencyTypesNot: ["type-only"] } },
    { name: "nothing-imports-seed-or-tests", comment: "Demo data and tests use the product, never the other way round.", severity: "error",
      from: { path: "^(app|modules|db|worker)/", pathNot: TEST }, to: { path: "^(seed|tests)/" } },
    { name: "no-circle", comment: "Two files that need each other are one idea or three.", severity: "error", from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ["type-only"] } } },
    { name: "no-unresolved", comment: "This import leads nowhere.", severity: "error", from: {}, to: { couldNotResolve: true } },
  ],
  options: {
    tsConfig: { fileName: "tsconfig.json" },
    tsPreCompilationDeps: true,
    doNotFollow: { path: "node_modules" },
    exclude: { path: "^(\\.next|\\.data|\\.test|drizzle)/" },
    enhancedResolveOptions: { exportsFields: ["exports"], conditionNames: ["react-server", "import", "require", "node", "default", "types"], extensions: [".ts", ".tsx", ".mts", ".mjs", ".js", ".json", ".d.ts"] },
  },
};
