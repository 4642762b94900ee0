import { ask, mailedSecret, newEmail, PASSWORD, signInAs, signUpAs, told } from "../helpers/browser-requests";
import { expect, test } from "../helpers/browser-test";
import { untilTakenOver } from "../helpers/matrix-page";
import { expectRefused, textbox } from "../helpers/refused-field";

const OTHER_PASSWORD = "nine belts over the weir";
test.use({ expectedProblems: [/status of (401|422|429|409)/] });

test("signing up keeps what was typed until it is right, and starts a team", async ({ page }) => {
  await page.goto("/sign-up");
  await untilTakenOver(page);
  const [team, name, email] = ["Name of the team", "Your name", "E-mail address"].map((label) => textbox(page, label));
  const password = textbox(page, "Password");
  const send = page.getByRole("button", { name: "Start the team" });
  const address = newEmail();
  await email.fill(address);
  await send.click();
  await expectRefused(team, /Write a name here/);
  await expect(name).toHaveAttribute("aria-invalid", "true");
  await expect(password).toHaveAccessibleDescription(/At least 8 characters/);
  await expect(email).toHaveValue(address);
  await expect(email).not.toHaveAttribute("aria-invalid");
  await password.fill("password1");
  await send.click();
  await expectRefused(team, /Write a name here/);
  await expect(password).toHaveAccessibleDescription(/list that attackers try first/);
  await team.fill("Weir Works");
  await name.fill("Ada Kessler");
  for (const [typed, words] of [
    ["short", /At least 8 characters/],
    ["password1", /list that attackers try first/],
    ["Ada Kessler", /Your name, address or team is the first thing to be tried/],
  ] as const) {
    await password.fill(typed);
    await send.click();
    await expectRefused(password, words);
    await expect(page.getByRole("alert").getByRole("link")).toHaveText(/^Password: /);
    await expect(team).toHaveValue("Weir Works");
    await expect(email).toHaveValue(address);
  }
  await password.fill(PASSWORD);
  await send.click();
  await expect(page.getByRole("heading", { level: 1, name: "Plants" })).toBeVisible();
  await expect(page.getByRole("heading", { name: "Your first plant" })).toBeVisible();
  await expect(page.getByRole("button", { name: "Weir Works, lead, Ada Kessler: account menu" })).toBeVisible();
});

test("an address that has an account is told so at its field", async ({ page, anotherPerson }) => {
  const email = await signUpAs((await anotherPerson()).request, "First Here");
  await page.goto("/sign-up");
  await untilTakenOver(page);
  await textbox(page, "Name of the team").fill("Twice");
  await textbox(page, "Your name").fill("Second Here");
  await textbox(page, "E-mail address").fill(email);
  await textbox(page, "Password").fill(PASSWORD);
  await page.getByRole("button", { name: "Start the team" }).click();
  await expectRefused(textbox(page, "E-mail address"), /This address has an account already/);
});

test("a wrong password and an unknown address get the same words, and guessing on is made to wait", async ({
  page,
  anotherPerson,
}) => {
  const email = await signUpAs((await anotherPerson()).request, "Often Guessed");
  await page.goto("/sign-in?next=/account");
  await untilTakenOver(page);
  const [address, password] = [textbox(page, "E-mail address"), textbox(page, "Password")];
  const send = page.getByRole("button", { name: "Sign in", exact: true });
  const alert = page.getByRole("alert").filter({ hasText: "You are not signed in yet." });
  await send.click();
  await expectRefused(address, /Write your e-mail address here/);
  const tryOnce = async (who: string, what: string) => {
    await address.fill(who);
    await password.fill(what);
    await send.click();
    await expectRefused(password, /./);
    await expect(address).toHaveValue(who);
    return alert.textContent();
  };
  const unknown = await tryOnce(newEmail(), "whatever this is");
  expect(unknown).toContain("The address or the password is not right. Check both; capitals count in the password.");
  for (let count = 0; count < 5; count++) expect(await tryOnce(email, `not this one ${count}`)).toBe(unknown);
  await password.fill("not this one either");
  await send.click();
  await expect(alert).toContainText(/Too many tries\. Wait \d+ seconds, then try once more\./);
  // From elsewhere the person the account belongs to gets in.
  await signInAs((await anotherPerson()).request, email);
});

test("signing in leads to where somebody wanted to go, and signing out ends the session itself", async ({
  page,
  context,
  anotherPerson,
}) => {
  const email = await signUpAs((await anotherPerson()).request, "Comes Back");
  await page.goto("/team?tab=trail");
  await expect(page).toHaveURL(/\/sign-in\?next=%2Fteam/);
  await untilTakenOver(page);
  await textbox(page, "E-mail address").fill(email);
  await textbox(page, "Password").fill(PASSWORD);
  await page.keyboard.press("Enter");
  await expect(page).toHaveURL(/\/team/);
  const cookies = await context.cookies();
  await page.getByRole("button", { name: /account menu$/ }).click();
  await page.getByRole("menuitem", { name: "Sign out" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Sign in" })).toBeVisible();
  await context.addCookies(cookies);
  expect((await ask(context.request, "/api/v1/plants")).status()).toBe(401);
});

test("an invitation by mail brings somebody new into the team, once", async ({ page, anotherPerson }) => {
  await signUpAs(page.request, "Greta Holm");
  await page.goto("/team");
  await untilTakenOver(page);
  const email = newEmail();
  await textbox(page, "E-mail address").fill("not an address");
  await page.getByRole("button", { name: "Invite" }).click();
  await expectRefused(textbox(page, "E-mail address"), /Write an e-mail address, such as/);
  await textbox(page, "E-mail address").fill(email);
  await page.getByRole("combobox", { name: "Role", exact: true }).selectOption("reviewer");
  await page.getByRole("button", { name: "Invite" }).click();
  await expect(page.getByRole("table", { name: "Open invitations" })).toContainText(email);
  const secret = await mailedSecret(email, /^Greta Holm invites you to the team/);
  const guest = await anotherPerson();
  await guest.goto(`/invitations/${secret}`);
  await untilTakenOver(guest);
  await expect(guest.getByText(`Greta Holm invites ${email} as reviewer.`)).toBeVisible();
  await guest.getByRole("button", { name: "Join the team" }).click();
  await expectRefused(textbox(guest, "Your name"), /Write a name here/);
  await textbox(guest, "Your name").fill("Ivo Brandt");
  await textbox(guest, "Password").fill(PASSWORD);
  await guest.getByRole("button", { name: "Join the team" }).click();
  await expect(guest.getByRole("button", { name: /, reviewer, Ivo Brandt: account menu$/ })).toBeVisible();
  await page.reload();
  await expect(page.getByRole("table", { name: "Members of the team" })).toContainText("Ivo Brandt");
  await expect(page.getByText("No invitation is open.")).toBeVisible();
  const late = await anotherPerson();
  await late.goto(`/invitations/${secret}`);
  await expect(late.getByText("This link does not work any more.")).toBeVisible();
});

test("an invitation opened by the wrong person is left for the right one, who only has to sign in", async ({
  page,
  anotherPerson,
}) => {
  await signUpAs(page.request, "Greta Holm");
  const invited = await anotherPerson();
  const email = await signUpAs(invited.request, "Ivo Brandt");
  await told(page.request, "/api/v1/team/invitations", { data: { email, role: "engineer" } });
  const link = `/invitations/${await mailedSecret(email, /^Greta Holm invites you/)}`;
  await page.goto(link);
  await expect(page.getByText(`The invitation is for ${email}, so only they can accept it.`)).toBeVisible();
  await invited.context().clearCookies();
  await invited.goto(link);
  await invited.getByRole("link", { name: `Sign in as ${email}` }).click();
  await untilTakenOver(invited);
  await textbox(invited, "E-mail address").fill(email);
  await textbox(invited, "Password").fill(PASSWORD);
  await invited.getByRole("button", { name: "Sign in", exact: true }).click();
  await invited.getByRole("button", { name: "Join the team" }).click();
  await expect(invited.getByRole("button", { name: /^First team of Greta Holm, engineer/ })).toBeVisible();
});

test("a forgotten password is replaced by mail, which ends every session and works once", async ({ page, anotherPerson }) => {
  const elsewhere = await anotherPerson();
  const email = await signUpAs(elsewhere.request, "Forgets It");
  await page.goto("/forgotten-password");
  await untilTakenOver(page);
  await page.getByRole("button", { name: "Send the link" }).click();
  await expectRefused(textbox(page, "E-mail address"), /Write an e-mail address/);
  const words = async (address: string) => {
    await textbox(page, "E-mail address").fill(address);
    await page.getByRole("button", { name: "Send the link" }).click();
    const said = page.getByRole("status").filter({ hasText: address });
    await expect(said).toBeVisible();
    return (await said.textContent())?.replace(address, "…");
  };
  expect(await words(newEmail())).toBe(await words(email));
  const link = `/reset-password/${await mailedSecret(email, /^Choose a new password$/)}`;
  await page.goto(link);
  await untilTakenOver(page);
  await textbox(page, "New password").fill("short");
  await page.getByRole("button", { name: "Save the new password" }).click();
  await expectRefused(textbox(page, "New password"), /At least 8 characters/);
  await textbox(page, "New password").fill(OTHER_PASSWORD);
  await page.getByRole("button", { name: "Save the new password" }).click();
  await page.getByRole("main").getByRole("link", { name: "Sign in" }).click();
  expect((await ask(elsewhere.request, "/api/v1/plants")).status()).toBe(401);
  await expect(signInAs(page.request, email, PASSWORD)).rejects.toThrow("CredentialsSignin");
  await signInAs(page.request, email, OTHER_PASSWORD);
  const late = await anotherPerson();
  await late.goto(link);
  await untilTakenOver(late);
  await textbox(late, "New password").fill(OTHER_PASSWORD);
  await late.getByRole("button", { name: "Save the new password" }).click();
  await expect(late.getByRole("main")).toContainText("The link was used already or is older than 60 minutes. Ask for a new one");
});

test("a changed password ends the other sessions and keeps this one", async ({ page, anotherPerson }) => {
  const email = await signUpAs(page.request, "Changes It");
  const elsewhere = await anotherPerson();
  await signInAs(elsewhere.request, email);
  await page.goto("/account");
  await untilTakenOver(page);
  const [present, next] = [textbox(page, "Present password"), textbox(page, "New password")];
  await present.fill("not the present one");
  await next.fill(OTHER_PASSWORD);
  await page.getByRole("button", { name: "Change the password" }).click();
  await expectRefused(present, /This is not your present password/);
  await expect(next).toHaveValue(OTHER_PASSWORD);
  await present.fill(PASSWORD);
  await page.getByRole("button", { name: "Change the password" }).click();
  await expect(page.getByText("The password is changed.")).toBeVisible();
  expect((await ask(elsewhere.request, "/api/v1/plants")).status()).toBe(401);
  expect((await ask(page.request, "/api/v1/plants")).status()).toBe(200);
});

test("sessions are ended everywhere else, and then everywhere", async ({ page, context, anotherPerson }) => {
  const email = await signUpAs(page.request, "Lost Tablet");
  const tablet = await anotherPerson();
  await signInAs(tablet.request, email);
  await page.goto("/account");
  await untilTakenOver(page);
  await page.getByRole("button", { name: "Sign out everywhere else" }).click();
  await expect(page.getByText("One other session was ended.")).toBeVisible();
  expect((await ask(tablet.request, "/api/v1/account")).status()).toBe(401);
  const cookies = await context.cookies();
  await page.getByRole("button", { name: "Sign out everywhere", exact: true }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Sign out everywhere" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Sign in" })).toBeVisible();
  await context.addCookies(cookies);
  expect((await ask(context.request, "/api/v1/account")).status()).toBe(401);
});

test("the small forms of account and team say what is missing at their field", async ({ page }) => {
  await signUpAs(page.request, "Fills Forms");
  await page.goto("/account");
  await untilTakenOver(page);
  const small = [
    { field: "Name", button: "Save the name", typed: " ", words: /Write a name here/ },
    { field: "What it is for", button: "Make an access token", typed: "", words: /Write a name here/ },
    { field: "Name of the new team", button: "Start a team", typed: "", words: /Write a name here/ },
    { field: "Link of an invitation", button: "Look at the invitation", typed: "abc", words: /not a whole invitation link/ },
  ] as const;
  for (const { field, button, typed, words } of small) {
    await textbox(page, field).fill(typed);
    await page.getByRole("button", { name: button }).click();
    await expectRefused(textbox(page, field), words);
    await expect(textbox(page, field)).toHaveValue(typed);
  }
  await textbox(page, "What it is for").fill("A script");
  await textbox(page, "Ends after").fill("4000");
  await page.getByRole("button", { name: "Make an access token" }).click();
  await expectRefused(textbox(page, "Ends after"), /At most 365 days/);
  await textbox(page, "Ends after").fill("30");
  await page.getByRole("button", { name: "Make an access token" }).click();
  await expect(page.getByRole("table", { name: "Your access tokens" })).toContainText("A script");
  await page.goto("/team");
  await untilTakenOver(page);
  await page.getByRole("button", { name: "Rename the team" }).click();
  const dialog = page.getByRole("dialog", { name: "Rename the team" });
  await textbox(dialog, "Name of the team").fill("");
  await dialog.getByRole("button", { name: "Save the name" }).click();
  await expectRefused(textbox(dialog, "Name of the team"), /Write a name here/);
});
