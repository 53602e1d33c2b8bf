import "server-only";
import { renderPdf } from "@/modules/outbound/pdf/render";
import type { ReportSnapshot } from "../domain/report-snapshot";
import { DENSITIES, flowReport } from "./flow-report";

/** Pages of a file as rendered here. */
export const pagesOf = (bytes: Buffer): number => bytes.toString("latin1").match(/\/Type \/Page\b(?!s)/g)?.length ?? 0;

/**
 * The paper of a report. It is set closer until it stands on one page; what will not fit even then goes on to a second. Papers of older
 * kinds keep their setting. The same snapshot gives the same bytes.
 */
export async function reportPaper(s: ReportSnapshot): Promise<Buffer> {
  const options = { creationDate: new Date(s.issuedAt) };
  if (s.kind < 4) return renderPdf(flowReport(s), options);
  const [roomy, ...closer] = DENSITIES;
  let bytes = await renderPdf(flowReport(s, roomy), options);
  for (const density of closer) {
    if (pagesOf(bytes) <= 1) break;
    bytes = await renderPdf(flowReport(s, density), options);
  }
  return bytes;
}
