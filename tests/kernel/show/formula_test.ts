import { formula, mathText, texToMathML } from "../../../kernel/show/formula.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

Deno.test("formula: is MathML, TeX and readable text", () => {
  const { bundle } = formula("A = \\frac{2}{\\pi} I_{\\mathrm{tail}} R", {
    where: { R: "parallel loss resistance <differential>" },
  });
  assertEquals(
    bundle["text/plain"],
    "A = 2/π I_tail R\n  R: parallel loss resistance <differential>",
  );
  assertEquals(bundle["text/latex"], "$$A = \\frac{2}{\\pi} I_{\\mathrm{tail}} R$$");
  const html = String(bundle["text/html"]);
  assert(/<math display="block"[^>]*>.*<mfrac>.*<\/math>/s.test(html));
  assert(html.includes("&lt;differential&gt;"));
});

Deno.test("mathText: writes fractions, roots, powers and sums in a line", () => {
  const text = (tex: string) => mathText(texToMathML(tex));
  assertEquals(text("\\sqrt{\\frac{L}{C}}"), "√(L/C)");
  assertEquals(text("\\frac{g_m R}{2} \\ge 2"), "(g_m R)/2 ≥ 2");
  assertEquals(text("\\left(\\frac{f_0}{2 Q}\\right)^2"), "(f_0/(2 Q))^2");
  assertEquals(text("\\omega_0^2 L C = 1"), "ω_0^2 L C = 1");
});

Deno.test("texToMathML: TeX that cannot be read is a message, not half a formula", () => {
  assertThrows(() => texToMathML("\\frac{1"), SyntaxError, /Cannot read the formula "\\frac\{1"/);
});
