import { LoadingPage } from "@/components/ui/loading-page";

export default function Loading() {
  return <LoadingPage label="Laying the designs side by side" lines={10} />;
}
