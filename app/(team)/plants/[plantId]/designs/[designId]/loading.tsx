import { LoadingPage } from "@/components/ui/loading-page";

export default function Loading() {
  return <LoadingPage label="Loading the design" lines={8} />;
}
