import { SkeletonPage } from "@/modules/ui/skeleton";

export default function Loading() {
  return <main id="main" className="page"><SkeletonPage label="Fetching purchase orders." /></main>;
}
