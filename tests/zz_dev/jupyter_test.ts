/**
 * The first template as people open it: in Jupyter Notebook, in a browser; and run by nbclient. Its
 * figures must be those of our own runner, to the last digit: it is the same computation.
 */
import { chromium } from "playwright-core";
import { openNotebook } from "../../kernel/run/notebook_run.ts";
import { assert, assertEquals } from "../assert.ts";
import { startJupyter } from "./jupyter_server.ts";
import { figuresOf, outputsOf } from "./payloads.ts";
import { findPrograms, isLeftOut } from "./programs.ts";
import { setStage } from "./stage.ts";

const TEMPLATE = "bias_selection.ipynb";
/** How long the notebook may take in a browser or under nbclient [s]. */
const RUN_LIMIT = 180;
/** Outputs may come after the kernel has said that it is idle; quiet for so long means all [ms]. */
const QUIET = 1500;

/** What the page's own script offers, as far as it is used here. */
interface NotebookPage {
  readonly Jupyter?: {
    readonly notebook?: {
      readonly kernel?: { is_connected(): boolean };
      readonly _fully_loaded?: boolean;
      execute_all_cells(): void;
      set_autosave_interval(milliseconds: number): void;
      toJSON(): unknown;
      get_cells(): readonly { cell_type: string; input_prompt_number?: unknown }[];
    };
  };
}

const { chromium: browserPath, jupyterNotebook, python } = findPrograms();

async function figuresOfRunner(path: string) {
  await using run = await openNotebook(path);
  await run.runCells();
  const figures = figuresOf(run.cells.flatMap(({ outputs }) => outputs));
  assert(Object.keys(figures).length > 0, "the runner has seen no verdict and no figure");
  return figures;
}

const inBrowser = `${TEMPLATE}, Run All in Jupyter Notebook shows the figures of our runner`;
Deno.test({
  name: inBrowser,
  ignore: isLeftOut(inBrowser, { "Chromium": browserPath, "Jupyter Notebook": jupyterNotebook }),
  // The browser's driver keeps timers and pipes of its own beyond close.
  sanitizeOps: false,
  sanitizeResources: false,
  async fn() {
    assert(browserPath !== undefined, "Chromium cannot be found");
    assert(jupyterNotebook !== undefined, "Jupyter Notebook cannot be found");
    await using stage = await setStage(TEMPLATE);
    const expected = await figuresOfRunner(stage.path);
    await using server = await startJupyter(jupyterNotebook, stage);
    const browser = await chromium.launch({
      executablePath: browserPath,
      args: ["--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage"],
    });
    try {
      const page = await browser.newPage({ viewport: { width: 1100, height: 1400 } });
      const pageErrors: string[] = [];
      page.on("pageerror", (error) => pageErrors.push(error.message));
      await page.goto(server.pageOf(TEMPLATE));
      const limit = { timeout: 1000 * RUN_LIMIT, polling: 200 };
      await page.waitForFunction(
        () => {
          const notebook = (globalThis as NotebookPage).Jupyter?.notebook;
          return notebook?._fully_loaded && notebook.kernel?.is_connected();
        },
        undefined,
        limit,
      );
      await page.evaluate(() => {
        const notebook = (globalThis as NotebookPage).Jupyter?.notebook;
        notebook?.set_autosave_interval(0);
        notebook?.execute_all_cells();
      });
      await page.waitForFunction(
        () =>
          (globalThis as NotebookPage).Jupyter?.notebook?.get_cells().every((cell) =>
            cell.cell_type !== "code" || typeof cell.input_prompt_number === "number"
          ),
        undefined,
        limit,
      );
      let notebook: unknown;
      let text = "";
      for (let before = ""; before === "" || JSON.stringify(notebook) !== before;) {
        before = JSON.stringify(notebook) ?? "";
        await page.waitForTimeout(QUIET);
        notebook = await page.evaluate(() =>
          (globalThis as NotebookPage).Jupyter?.notebook?.toJSON()
        );
        text = await page.locator("#notebook-container").innerText();
      }
      const shots = await Deno.makeTempDir({ prefix: "tankwright-page-" });
      const container = page.locator("#notebook-container");
      const { height } = await container.boundingBox() ?? { height: 1400 };
      // The page scrolls inside itself: as high as the notebook, all of it is in the picture.
      await page.setViewportSize({ width: 1100, height: Math.min(Math.ceil(height) + 200, 16000) });
      await container.screenshot({ path: `${shots}/page.png` });
      console.log(`screenshot of the page: ${shots}/page.png`);

      assertEquals(figuresOf(outputsOf(notebook)), expected);
      const errors = outputsOf(notebook).filter((output) => "ename" in output);
      assertEquals(errors, []);
      for (const name of Object.keys(expected).filter((key) => key.startsWith("verdict "))) {
        assert(text.includes(name.slice("verdict ".length)), `the page does not show ${name}`);
      }
      assertEquals(pageErrors, []);
    } finally {
      await browser.close();
    }
  },
});

/**
 * Runs the notebook named first and prints every display that was published while it ran. What is
 * published after the kernel has said that a cell is done may be lost to nbclient's own notebook (1 run
 * in 6 lost some after 300 printed lines), so what comes over the channel is kept here.
 */
const NBCLIENT = `
import asyncio, json, os, sys, nbformat
from nbclient import NotebookClient

heard = []

class Listening(NotebookClient):
    async def async_start_new_kernel_client(self):
        client = await super().async_start_new_kernel_client()
        channel, plain = client.iopub_channel, client.iopub_channel.get_msg
        async def get_msg(*args, **options):
            message = await plain(*args, **options)
            if "data" in message["content"]:
                heard.append({"data": message["content"]["data"]})
            return message
        channel.get_msg = get_msg
        return client

    async def async_execute_cell(self, cell, index, **options):
        cell = await super().async_execute_cell(cell, index, **options)
        if index == len(self.nb.cells) - 1:
            try:
                while True:
                    await self.kc.iopub_channel.get_msg(timeout=${QUIET / 1000})
            except Exception as end:
                if type(end).__name__ != "Empty":
                    raise
        return cell

path = sys.argv[1]
Listening(
    nbformat.read(path, as_version=4),
    timeout=int(sys.argv[2]),
    kernel_name="tankwright",
    resources={"metadata": {"path": os.path.dirname(path)}},
).execute()
print(json.dumps(heard))
`;

const byNbclient = `${TEMPLATE}, run by nbclient yields the figures of our runner`;
Deno.test({
  name: byNbclient,
  ignore: isLeftOut(byNbclient, { "Python with nbclient": python }),
  async fn() {
    assert(python !== undefined, "no Python with nbclient can be found");
    await using stage = await setStage(TEMPLATE);
    const expected = await figuresOfRunner(stage.path);
    const { success, stdout, stderr } = await new Deno.Command(python, {
      args: ["-c", NBCLIENT, stage.path, String(RUN_LIMIT)],
      env: { ...stage.env },
    }).output();
    const decoder = new TextDecoder();
    assert(success, decoder.decode(stderr).slice(-2000));
    assertEquals(figuresOf(JSON.parse(decoder.decode(stdout))), expected);
  },
});
