import { newEmail, PASSWORD } from "../helpers/browser-requests";
import { expect, test } from "../helpers/browser-test";
import { cellOf, onClipboard, untilTakenOver } from "../helpers/matrix-page";
import { textbox } from "../helpers/refused-field";

const MOST_ACTIONS = 12;
const MOST_SECONDS = 180;

/** Counts what a person does: a press, a field filled in, a paste. */
function counted() {
  const started = Date.now();
  let actions = 0;
  return {
    act: async (work: Promise<unknown>) => {
      actions += 1;
      await work;
    },
    done: (what: string) => {
      const seconds = (Date.now() - started) / 1_000;
      console.log(`${what}: ${actions} actions, ${seconds.toFixed(1)} s`);
      expect(actions).toBeLessThanOrEqual(MOST_ACTIONS);
      expect(seconds).toBeLessThanOrEqual(MOST_SECONDS);
    },
  };
}

test("a newcomer gets from sign-up to a first coupled response in at most twelve actions", async ({ page }) => {
  test.setTimeout(240_000);
  await page.goto("/sign-up");
  await untilTakenOver(page);
  const { act, done } = counted();
  await act(textbox(page, "Name of the team").fill("Weir Works"));
  await act(textbox(page, "Your name").fill("Ada Kessler"));
  await act(textbox(page, "E-mail address").fill(newEmail()));
  await act(textbox(page, "Password").fill(PASSWORD));
  await act(page.keyboard.press("Enter"));
  await act(page.getByRole("link", { name: "Enter a plant" }).click());
  await act(textbox(page, "Name of the plant").fill("Beam with two drives"));
  await act(cellOf(page, "A", 3, 1).click());
  await onClipboard(page, "-40\t12\t-0.4\t0\n12\t-40\t0\t-0.4");
  await act(page.keyboard.press("Control+v"));
  await act(page.getByRole("button", { name: "Save plant" }).click());
  await act(page.getByRole("link", { name: "New design" }).click());
  await act(page.getByRole("button", { name: "Solve", exact: true }).first().click());
  const responses = page.getByRole("region", { name: "Coupled response" });
  await expect(responses.getByRole("img").first()).toBeVisible({ timeout: 30_000 });
  done("from sign-up to a coupled response");
  await expect(responses).toContainText("y2");
});

test("a visitor of the demonstration sees a coupled response after a few presses", async ({ page }) => {
  await page.goto("/");
  await untilTakenOver(page);
  const { act, done } = counted();
  await act(page.getByRole("button", { name: "Try the demo team" }).click());
  const plants = page.getByRole("table", { name: "Plants of the team" });
  await act(plants.getByRole("link").first().click());
  await act(page.getByRole("tab", { name: /^Designs/ }).click());
  await act(
    page
      .getByRole("table", { name: /^Designs of this plant/ })
      .getByRole("link")
      .first()
      .click(),
  );
  await expect(page.getByRole("region", { name: "Coupled response" }).getByRole("img").first()).toBeVisible({ timeout: 30_000 });
  done("through the demonstration");
});
