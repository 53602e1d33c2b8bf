"use client";

import { useWatch } from "react-hook-form";
import { decimal } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { LIMIT_FACTS, LIMIT_KEYS, SANITY_LIMITS, shownLimit, type OwnLimits, type SanityLimit } from "../domain/sanity-limits";
import { setFlowLimitsAction } from "../limits-actions";
import { flowLimitsInput } from "../limits-input";
import { fieldText, useGearDone } from "./gear-done";

/** A limit with its unit: at most the digits it has. */
function limitText(key: SanityLimit, kept: number, locale: string): string {
  const shown = shownLimit(key, kept);
  return `${decimal(shown, String(shown).split(".")[1]?.length ?? 0, locale)} ${LIMIT_FACTS[key].unit}`;
}

/** Every limit of the checks: a well each, the product's beside it. Empty is the product's. */
export function LimitsForm({ own, version }: { own: OwnLimits; version: number }) {
  const { slug, locale } = usePlace();
  const done = useGearDone("limits");
  const text = (key: SanityLimit): string => (own[key] === undefined ? "" : fieldText(shownLimit(key, own[key])));
  const form = useCommandForm({
    schema: flowLimitsInput,
    defaultValues: {
      version, fallShare: text("fallShare"), zeroLiftExtraCfm: text("zeroLiftExtraCfm"), percentLow: text("percentLow"), percentHigh: text("percentHigh"), cdLow: text("cdLow"), cdHigh: text("cdHigh"),
      offNominalShare: text("offNominalShare"), outlierTimesMedian: text("outlierTimesMedian"), outlierShareMin: text("outlierShareMin"), gainShare: text("gainShare"), zeroDriftMm: text("zeroDriftMm"), leakShare: text("leakShare"),
    },
    action: (request) => setFlowLimitsAction(slug, request),
    onDone: () => done("Limits kept"),
  });
  const values = useWatch({ control: form.rhf.control });
  return (
    <section className="plate" aria-label="Limits of the checks">
      <h2 className="mb-4">Limits of the checks</h2>
      <CommandForm form={form} toFix="before the limits are kept">
        <div className="fields">
          {LIMIT_KEYS.map((key) => {
            const { label, unit } = LIMIT_FACTS[key];
            const back = () => { form.rhf.setValue(key, "", { shouldDirty: true, shouldValidate: true }); form.rhf.setFocus(key); };
            return (
              <div key={key}>
                <TextInput name={key} label={label} unit={unit} inputMode="decimal" autoComplete="off" alignEnd optional hint={`Product default ${limitText(key, SANITY_LIMITS[key], locale)}.`} />
                {values[key] ? <Button variant="lo" size="sm" onClick={back} aria-label={`Back to default: ${label}`}>Back to default</Button> : null}
              </div>
            );
          })}
        </div>
        <p className="hint">An empty field is the product default. Always told: a coefficient above 1, more than the smallest section can pass, a pressure more than 2 % off. Figures do not change, only what is doubted; issued reports stay as they are.</p>
        <div className="form-act"><SubmitButton>Keep limits</SubmitButton></div>
      </CommandForm>
    </section>
  );
}

/** The limits that hold, for who may not set them. */
export function LimitsTable({ own, locale }: { own: OwnLimits; locale: string }) {
  return (
    <table className="calm">
      <caption className="sr-only">Limits of the checks</caption>
      <thead><tr><th scope="col">Check</th><th scope="col" className="r">Limit</th><th scope="col" className="r">Product default</th></tr></thead>
      <tbody>{LIMIT_KEYS.map((key) => (
        <tr key={key}><th scope="row">{LIMIT_FACTS[key].label}</th><td className="r q nw"><b>{limitText(key, own[key] ?? SANITY_LIMITS[key], locale)}</b></td><td className="r q nw">{limitText(key, SANITY_LIMITS[key], locale)}</td></tr>
      ))}</tbody>
    </table>
  );
}
