import { date } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { TextLink } from "@/modules/ui/text-link";
import type { IssuedReport } from "../queries/issued-reports";

/** Every report issued of a head, newest first: older ones stay where they were, and say which one stands in for them. */
export function IssuedReports({ reports, slug, locale, zone, className }: { reports: readonly IssuedReport[]; slug: string; locale: string; zone: string; className?: string }) {
  if (reports.length === 0) return null;
  const ports = new Set(reports.map((r) => r.cylinder)).size;
  return (
    <ul className={className} aria-label="Reports">
      {reports.map((r) => {
        const newer = reports.filter((x) => x.cylinder === r.cylinder && x.comparisonNo > r.comparisonNo).at(-1);
        return (
          <li key={r.id} className="sm">
            <TextLink newTab href={`/s/${slug}/flow/reports/${r.id}`}>Report {r.comparisonNo}{ports > 1 || r.cylinder > 1 ? `, port ${r.cylinder}` : ""}</TextLink>
            <span className="mid">, {date(localDate(new Date(r.issuedAt), zone), locale)}, {r.issuedBy}.{newer ? ` Replaced by report ${newer.comparisonNo}.` : ""}{r.replaces ? ` Replaces report ${r.replaces.comparisonNo}: ${r.replaces.why}.` : ""}</span>
          </li>
        );
      })}
    </ul>
  );
}
