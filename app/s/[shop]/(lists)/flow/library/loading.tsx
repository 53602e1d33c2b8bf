import { SkeletonPage } from "@/modules/ui/skeleton";

export default function Loading() {
  return <SkeletonPage label="Fetching the library." />;
}
