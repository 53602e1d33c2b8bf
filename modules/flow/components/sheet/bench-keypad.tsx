"use client";
import { Icon } from "@/modules/ui/icon";

/** A keypad for gloves: keys write into the cell in hand. Pressing one leaves the focus in the cell. */
export function BenchKeypad({ name, onDigit, onBack, onBench, onBackLift, onNextLift, onDoubt }: {
  name: string; onDigit: (digit: string) => void; onBack: () => void; onBench: () => void; onBackLift: () => void; onNextLift: () => void; onDoubt: () => void;
}) {
  const key = (label: string) => <button key={label} type="button" onClick={() => onDigit(label)}>{label}</button>;
  return (
    <div className="keypad" role="group" aria-label={`Keypad for ${name}`} onPointerDown={(e) => e.preventDefault()}>
      {["7", "8", "9"].map(key)}
      <button type="button" className="w" aria-label="Back one digit" onClick={onBack}><Icon name="left" size={26} weight={2} /></button>
      {["4", "5", "6"].map(key)}
      <button type="button" className="w" onClick={onBench}>From bench</button>
      {["1", "2", "3"].map(key)}
      <button type="button" className="w" onClick={onBackLift}>Back a lift</button>
      <button type="button" className="w" aria-label="Mark this reading as doubtful" onClick={onDoubt}>Doubt</button>
      {["0", "."].map(key)}
      <button type="button" className="w k1" onClick={onNextLift}>Next lift</button>
    </div>
  );
}
