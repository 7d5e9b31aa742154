/**
 * The companion command: `report` and `begin`.
 *
 * @module
 */
import { runProcess } from "./run_process.ts";

if (import.meta.main) await runProcess();
