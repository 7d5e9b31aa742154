import {
  folderFromArguments,
  InstallError,
  installKernel,
  jupyterDataFolder,
  kernelspec,
} from "../../kernel/install.ts";
import { assert, assertEquals, assertThrows } from "../assert.ts";

const script = decodeURIComponent(new URL("../../kernel/install.ts", import.meta.url).pathname);

async function install(args: readonly string[], env: Record<string, string>) {
  const { code, stdout, stderr } = await new Deno.Command(Deno.execPath(), {
    args: ["run", "-A", "--no-check", script, ...args],
    env: { NO_COLOR: "1", ...env },
  }).output();
  const decoder = new TextDecoder();
  return { code, stdout: decoder.decode(stdout), stderr: decoder.decode(stderr) };
}

Deno.test("install, writes a kernelspec of this Deno and says where and how to start", async () => {
  const folder = await Deno.makeTempDir();
  const cases: [args: string[], env: Record<string, string>, data: string][] = [
    [["--dir", `${folder}/a`], {}, `${folder}/a`],
    [["--prefix", `${folder}/b`], {}, `${folder}/b/share/jupyter`],
    [[], { JUPYTER_DATA_DIR: `${folder}/c` }, `${folder}/c`],
  ];
  for (const [args, env, data] of cases) {
    const { code, stdout, stderr } = await install(args, env);
    assertEquals([code, stderr], [0, ""]);
    const file = `${data}/kernels/tankwright/kernel.json`;
    assertEquals(JSON.parse(await Deno.readTextFile(file)), kernelspec(Deno.execPath()));
    assertEquals([...Deno.readDirSync(`${data}/kernels/tankwright`)].length, 1);
    assert(stdout.includes(file) && /cd \S*\/notebooks && .*jupyter notebook/.test(stdout), stdout);
  }
  await Deno.remove(folder, { recursive: true });
});

Deno.test("install, says so in plain words when it cannot write or is asked oddly", async () => {
  const folder = await Deno.makeTempDir();
  await Deno.writeTextFile(`${folder}/file`, "");
  const refused = await install(["--dir", `${folder}/file`], {});
  assertEquals(refused.code, 1);
  assert(/^Cannot write .*kernel\.json: .*; choose a folder/.test(refused.stderr), refused.stderr);
  assert(!/\n\s+at /.test(refused.stderr));
  const odd = await install(["--folder", folder], {});
  assertEquals(odd.code, 1);
  assert(odd.stderr.includes("Usage:"), odd.stderr);
  await Deno.remove(folder, { recursive: true });
});

Deno.test("installKernel, replaces an earlier one", () => {
  const folder = Deno.makeTempDirSync();
  installKernel(folder, "/old/deno");
  const file = installKernel(folder, "/new/deno");
  assertEquals(JSON.parse(Deno.readTextFileSync(file)).argv[0], "/new/deno");
  Deno.removeSync(folder, { recursive: true });
});

Deno.test("kernelspec, is interrupted by message", () => {
  // A signal, Jupyter's default, ends Deno's kernel.
  assertEquals(kernelspec("deno").interrupt_mode, "message");
});

Deno.test("jupyterDataFolder, follows Jupyter's rules on each system", () => {
  // Source: Jupyter documentation, "Common Directories and File Locations", section "Data files".
  const of = (os: string, env: Record<string, string>) =>
    jupyterDataFolder({ os, env: (name) => env[name] });
  assertEquals(of("linux", { HOME: "/h/a" }), "/h/a/.local/share/jupyter");
  assertEquals(of("linux", { HOME: "/h/a", XDG_DATA_HOME: "/data" }), "/data/jupyter");
  assertEquals(of("darwin", { HOME: "/u/a", XDG_DATA_HOME: "/d" }), "/u/a/Library/Jupyter");
  assertEquals(of("windows", { APPDATA: "C:\\a" }), "C:\\a\\jupyter");
  assertEquals(of("linux", { HOME: "/h/a", JUPYTER_DATA_DIR: "/j" }), "/j");
  assertThrows(() => of("linux", {}), InstallError, /HOME is not set/);
  assertThrows(() => of("windows", {}), InstallError, /APPDATA is not set/);
});

Deno.test("folderFromArguments, takes one option with a folder", () => {
  assertEquals(folderFromArguments([]), undefined);
  assertEquals(folderFromArguments(["--dir", "a"]), "a");
  assertEquals(folderFromArguments(["--prefix", "a"]), "a/share/jupyter");
  for (const args of [["--dir"], ["a"], ["--dir", "a", "b"]]) {
    assertThrows(() => folderFromArguments(args), InstallError, /Usage/);
  }
});
