// Opens the page and looks: a squiggle, a hover with its picture drawn, an inlay
// hint, a lens. Keeps a screenshot.
// usage: NODE_PATH=… node look.js URL FILE_NAME SCREENSHOT [wait-only FILE]
const { chromium } = require("playwright-core");
const fs = require("fs");
const os = require("os");
const path = require("path");

const [url, name, screenshot, mode, file] = process.argv.slice(2);
const flags = ["--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"];

async function open(page) {
  await page.goto(url);
  await page.waitForSelector(".monaco-workbench", { timeout: 60_000 });
}

async function look(page) {
  const row = page.locator(".explorer-folders-view .monaco-list-row", { hasText: name });
  await row.waitFor({ timeout: 60_000 });
  await row.dblclick();
  await page.waitForSelector(".monaco-editor .view-line", { timeout: 30_000 });
  // Room for the text: the side bar and the other panes go.
  await page.keyboard.press("Control+B");
  await page.waitForSelector(".squiggly-error, .squiggly-warning", { timeout: 60_000 });
  const lens = page.locator(".codelens-decoration").first();
  await lens.waitFor({ timeout: 20_000 });
  const texts = async () => (await page.locator(".view-line").allInnerTexts()).join("\n").replace(/\u00a0/g, " ");
  for (let i = 0; !/beam *r1.*(kNm|%)/.test(await texts()); i++) {
    if (i > 200) {
      throw new Error("no inlay hint: " + (await texts()));
    }
    await page.waitForTimeout(50);
  }
  const member = page.locator(".view-line", { hasText: /beam\s+r1/ }).first().locator("span", { hasText: "r1" }).last();
  const picture = page.locator(".monaco-hover img").first();
  for (let i = 0; i < 5 && !(await picture.isVisible().catch(() => false)); i++) {
    await page.mouse.move(10, 10);
    await member.hover();
    await picture.waitFor({ timeout: 4_000 }).catch(() => {});
  }
  const drawn = await picture.evaluate((e) => e.complete && e.naturalWidth > 0);
  if (!drawn) {
    throw new Error("the picture is not drawn");
  }
  // The numbers stand first; the picture is scrolled into sight.
  const box = await page.locator(".monaco-hover:visible").first().boundingBox();
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
  for (let i = 0; i < 4; i++) {
    await page.mouse.wheel(0, 100);
    await page.waitForTimeout(150);
  }
  await page.waitForTimeout(700);
  await page.screenshot({ path: screenshot });
  console.log("workbench: squiggle, lens, hint and picture seen; lens:", await lens.innerText());
}

(async () => {
  const data = fs.mkdtempSync(path.join(os.tmpdir(), "look-"));
  const context = await chromium.launchPersistentContext(data, {
    executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
    headless: true,
    viewport: { width: 1280, height: 860 },
    args: flags,
  });
  const page = context.pages()[0] ?? (await context.newPage());
  try {
    await context.route((u) => !["127.0.0.1", "localhost"].includes(u.hostname), (route) => route.abort());
    await open(page);
    if (mode === "wait-only") {
      for (let i = 0; !fs.existsSync(file); i++) {
        if (i > 1800) {
          throw new Error("the probe never wrote its file");
        }
        await new Promise((resolve) => setTimeout(resolve, 50));
      }
    } else {
      await look(page);
    }
  } catch (error) {
    console.error("workbench:", error.message);
    await page.screenshot({ path: screenshot }).catch(() => {});
    process.exitCode = 1;
  }
  await context.close();
  fs.rmSync(data, { recursive: true, force: true });
})();
