import { randomUUID } from "node:crypto";
import { join } from "node:path";
import { projectFolder } from "../settings.js";

const sampleFiles = join(projectFolder, "data", "demo", "files");

/** The stops that the README shows: the picture's name, and how much of the page. */
export const readmeStops = {
  "today-recorder": { file: "today", heightPx: 900 },
  peers: { file: "peers", heightPx: 980 },
  "upload-season-problems": { file: "upload", heightPx: 900 },
};

/**
 * Walk the whole job, just far enough that every page has been seen in every state worth a picture.
 *
 * @param {object} given
 * @param {import("../passing-system.js").PassingSystem} given.system
 * @param {import("playwright-core").Browser} given.browser
 * @param {(name: string, page: import("playwright-core").Page) => Promise<void>} given.stop called at each of them
 */
export async function walk({ system, browser, stop }) {
  const { origin } = system;
  const open = async (subject) => {
    const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, timezoneId: "UTC" });
    const page = await context.newPage();
    const see = async (name, path) => {
      await page.goto(`${origin}${path}`, { waitUntil: "networkidle" });
      await stop(name, page);
    };
    if (subject !== null) await page.goto(`${origin}/auth/start?hint=${subject}`, { waitUntil: "networkidle" });
    return { page, see, close: () => context.close() };
  };

  await withoutSignIn(await open(null));
  const dell = await open("dell.farrow");
  await recorder(dell, stop);
  const maren = await open("maren.oake");
  await director(maren, stop);
  const ilse = await open("ilse.tarrant");
  await review(ilse, stop);
  await edition(ilse, stop);
  await workshop(ilse, stop);
  await network(ilse, stop);
  await maren.see("peers", "/peers");
  await peers(maren, stop);
  const tobin = await open("tobin.ashe");
  await tobin.see("today-returned", "/today");
  await tobin.see("season-returned", "/season/2025");
  await tobin.see("peers-without-figure", "/peers");
  await analyst(await open("ruben.vale"), stop);
}

async function withoutSignIn({ see, close }) {
  await see("front", "/");
  await see("protection", "/protection");
  await see("login", "/login");
  await see("login-no-account", "/login?problem=no-account");
  await see("login-expired", "/login?expired=1&returnTo=/uploads");
  await see("invitation-spent", `/invitations/${"x".repeat(43)}`);
  await see("not-found", "/no-such-page");
  await see("components", "/components");
  await close();
}

async function upload({ page }, kind, file) {
  await page.goto(new URL(`/uploads?kind=${kind}`, page.url()).href, { waitUntil: "networkidle" });
  await page.setInputFiles("input[type=file]", join(sampleFiles, file));
  await page.getByRole("button", { name: "Check the file" }).click();
  await page.waitForURL(/\/uploads\/\d+$/);
  await page.waitForLoadState("networkidle");
}

async function press({ page }, name) {
  const answered = page.waitForResponse((response) => response.request().method() === "POST");
  await page.getByRole("button", { name }).click();
  await answered;
  await page.waitForLoadState("networkidle");
}

async function recorder(dell, stop) {
  await dell.see("today-recorder", "/today");
  await dell.see("season-empty", "/season/2025");
  await dell.see("uploads-empty", "/uploads");
  await upload(dell, "season-figures", "quillbrook-season-2025-26-with-mistakes.csv");
  await stop("upload-season-problems", dell.page);
  await upload(dell, "calibrations", "quillbrook-calibrations-2026-with-mistakes.csv");
  await stop("upload-calibrations-problems", dell.page);
  await upload(dell, "season-figures", "quillbrook-season-2025-26.csv");
  await stop("upload-season-ready", dell.page);
  await press(dell, /^Accept/);
  await stop("upload-season-accepted", dell.page);
  await upload(dell, "calibrations", "quillbrook-calibrations-2026.csv");
  await stop("upload-calibrations-ready", dell.page);
  await press(dell, /^Accept/);
  await dell.see("uploads", "/uploads");
  await dell.see("fleet-recorder", "/fleet");
  await dell.see("season-draft-recorder", "/season/2025");
  await dell.see("forbidden", "/network");
}

async function director(maren, stop) {
  await maren.see("today-director", "/today");
  await maren.see("fleet-to-approve", "/fleet");
  await press(maren, /^Approve/);
  await stop("fleet", maren.page);
  await maren.page.getByRole("link", { name: "12", exact: true }).first().click();
  await maren.page.waitForURL(/\/fleet\/\d+$/);
  await stop("truck", maren.page);
  await maren.see("season-draft", "/season/2025");
  await press(maren, /^Send/);
  await stop("season-sent", maren.page);
  await maren.see("season-accepted", "/season/2024");
  await maren.see("workshops-empty", "/workshops");
  await maren.see("account", "/account");
}

async function review(ilse, stop) {
  await ilse.see("today-coordinator", "/today");
  await ilse.see("network", "/network");
  await ilse.see("review", "/network/review");
  await ilse.page.getByRole("link", { name: /at Fallowmere/ }).click();
  await ilse.page.waitForURL(/\/network\/review\/\d+$/);
  await stop("review-figure", ilse.page);
  await ilse.page.getByLabel("Question that goes back with it").fill("Why?");
  await press(ilse, "Send it back");
  await stop("review-figure-refused", ilse.page);
  await ilse.page
    .getByLabel("Question that goes back with it")
    .fill(
      "Your salt is ten times that of earlier seasons. Was a decimal point lost? Please correct it and send again.",
    );
  await press(ilse, "Send it back");
  await ilse.page.goto(new URL("/network/review", ilse.page.url()).href, { waitUntil: "networkidle" });
  await press(ilse, /together$|^Accept it$/);
  await stop("review-doubtful-left", ilse.page);
}

async function edition(ilse, stop) {
  await ilse.see("editions-to-publish", "/network/editions");
  await press(ilse, /^Publish/);
  await ilse.page.getByText("An edition is being computed.").waitFor();
  await stop("editions-computing", ilse.page);
  await ilse.page.getByText("An edition is being computed.").waitFor({ state: "hidden", timeout: 60_000 });
  await stop("editions", ilse.page);
}

async function workshop(ilse, stop) {
  await ilse.see("workshops-first", "/workshops");
  await ilse.page.getByLabel("Title").fill("Autumn workshop at the regional shed");
  await ilse.page.getByLabel("Day").fill("2026-12-10");
  await press(ilse, "Put it on the calendar");
  await ilse.page.waitForURL(/\/workshops\/\d+$/);
  await stop("workshop-empty", ilse.page);
  await addBoard(
    ilse,
    "rate-at-working-setting|all",
    "What keeps your working setting above the band: the gate, the speed, or the habit?",
  );
  await addBoard(
    ilse,
    "salt-per-event|size-50-149",
    "Which of your routes could do with one pass less, and who would notice?",
  );
  await stop("workshop", ilse.page);
  const boards = `${new URL(ilse.page.url()).pathname}/boards`;
  await ilse.see("board-1", `${boards}/1`);
  await ilse.see("board-2", `${boards}/2`);
  await ilse.see("workshops", "/workshops");
}

async function addBoard(ilse, shows, question) {
  const { page } = ilse;
  const before = await page.getByRole("row").count();
  await page.getByLabel("What it shows").selectOption(shows);
  await page.getByLabel("Question to discuss").fill(question);
  await press(ilse, "Add the board");
  await page.waitForFunction((count) => document.querySelectorAll("tr").length > count, before);
}

async function network(ilse, stop) {
  await ilse.see("people", "/network/people");
  // Nothing is sent: the form itself says what is missing.
  await ilse.page.getByRole("button", { name: "Send the invitation" }).click();
  await stop("people-refused", ilse.page);
  await ilse.page.getByLabel("Name").fill("Wynn Harrow");
  await ilse.page.getByLabel("Mail address").fill(`wynn.${randomUUID().slice(0, 4)}@otterfold.example`);
  await ilse.page.getByLabel("Role").selectOption("recorder");
  await ilse.page.getByLabel("Town").selectOption({ index: 5 });
  await press(ilse, "Send the invitation");
  await ilse.see("people-invited", "/network/people");
  await ilse.see("people-found", "/network/people?find=quill");
  await ilse.see("mail", "/network/mail");
  await ilse.see("audit", "/network/audit");
  await ilse.see("today-coordinator-later", "/today");
}

async function peers(maren, stop) {
  await maren.page.locator("details > summary").filter({ hasText: "Table" }).first().click();
  await stop("peers-table-open", maren.page);
  for (const group of ["size-50-149", "size-under-50"]) await maren.see(`peers-${group}`, `/peers?group=${group}`);
  await maren.see("today-director-later", "/today");
  await maren.see("workshops-director", "/workshops");
}

async function analyst(ruben, stop) {
  await ruben.see("today-analyst", "/today");
  await ruben.see("dataset-terms", "/dataset");
  await press(ruben, "Accept the terms");
  await stop("dataset", ruben.page);
  await ruben.see("tokens-empty", "/dataset/tokens");
  await ruben.page.getByLabel("What it is for").fill("The yearly report");
  await press(ruben, "Make the token");
  await stop("tokens", ruben.page);
}
