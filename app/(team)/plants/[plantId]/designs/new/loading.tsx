import { LoadingPage } from "@/components/ui/loading-page";

export default function Loading() {
  return <LoadingPage label="Preparing a new design" lines={8} />;
}
