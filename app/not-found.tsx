import { NothingHere } from "@/modules/ui/nothing-here";

export default function NotFound() {
  return <NothingHere home="/" />;
}
