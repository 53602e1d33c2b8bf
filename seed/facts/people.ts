import { Faker, en } from "@faker-js/faker";

/** Names that the demo does not give itself, from a fixed seed: the same shop every time. */
function demoNames(seed = 20260217): Faker {
  const faker = new Faker({ locale: [en] });
  faker.seed(seed);
  return faker;
}

export interface DemoCustomer { name: string; kind: "person" | "company"; email: string; phone: string; terms: "receipt" | "net_30"; address: string }

/** 22 riders, 8 engine builders, 7 dealers (net 30), 2 race teams, 1 abroad; the named ones come first. */
export function demoCustomers(): DemoCustomer[] {
  const f = demoNames();
  let phone = 142;
  const one = (name: string, kind: DemoCustomer["kind"], terms: DemoCustomer["terms"] = "receipt"): DemoCustomer => ({
    name, kind, terms, phone: `555-0${phone++}`, address: `${f.location.streetAddress()}\n${f.location.city()}`,
    email: `${name.toLowerCase().replace(/[^a-z]+/g, ".").replace(/^\.|\.$/g, "")}@mail.example`,
  });
  const riders = [one("Odalys Brennan", "person"), ...Array.from({ length: 21 }, () => one(f.person.fullName().replace(/^(Mr|Mrs|Ms|Miss|Dr)\.? |,? (Jr|Sr|I{1,3}|IV|V|MD|DDS|PhD|DVM)\.?$/g, ""), "person"))];
  const kinds = ["Engine Works", "Race Engines", "Motor Shop", "Cylinder Service", "Performance", "Engine Room", "Heads & Blocks", "Machine"];
  const builders = kinds.map((k) => one(`${f.person.lastName()} ${k}`, "company"));
  const dealers = [one("Bridgewick Cycles", "company", "net_30"), one("Pell Forks Powersports", "company", "net_30"), ...["Cycle", "Powersports", "Moto", "Motor Sales", "Trail Sports"].map((k) => one(`${f.person.lastName()} ${k}`, "company", "net_30"))];
  const teams = ["Racing", "Roadrace Team"].map((k) => one(`${f.location.city()} ${k}`, "company"));
  return [...riders, ...builders, ...dealers, ...teams, one("Halvard Eik Motor", "company")];
}
