import { linesOfPort } from "./curve-lines";
import { GainCurve } from "./gain-curve";
import type { PortGain } from "../domain/side-gain";

/** The small curve of an order, a clock, a phone: one port as handed out. */
export function MiniCurve({ port, locale, width = 430, height = 262 }: { port: PortGain; locale: string; width?: number; height?: number }) {
  const stated = port.intake.state === "absent" ? port.exhaust : port.intake;
  if (stated.state === "absent") return null;
  return <GainCurve lines={linesOfPort(port)} unit={stated.liftUnit} atInH2O={stated.atInH2O} camLiftUm={stated.camLiftUm} width={width} height={height} locale={locale} mini />;
}
