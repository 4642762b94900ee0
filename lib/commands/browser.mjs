import { canInstall, install, onPath } from "./apt.mjs";
import { Stop } from "./stop.mjs";

const names = ["chromium", "chromium-browser", "google-chrome-stable", "google-chrome"];

export const chromiumPath = () => process.env.CHROMIUM_PATH || names.map(onPath).find(Boolean);

/** The browser of the browser tests, installed from Debian's packages when root may do so. */
export function ensureChromium() {
  if (chromiumPath() || (canInstall() && install(["chromium"]) && chromiumPath())) return;
  throw new Stop(
    "The browser tests need Chromium, which was not found.",
    "Do one thing: install it (on Debian: sudo apt-get install chromium), and run this command again.",
    "Or set CHROMIUM_PATH to the program.",
  );
}
