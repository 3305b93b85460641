// Holds what the probe wrote to what an engineer must see.
const assert = require("assert/strict");
const out = JSON.parse(require("fs").readFileSync(process.argv[2], "utf8"));

assert.equal(out.error, undefined);
assert.equal(out.language, "span");
assert.match(out.hover, /My/);
assert.match(out.hover, /IPE 300/);
assert.ok(out.picture, "no picture in the hover");
assert.ok(out.hoverLength < 90_000, "the hover is so long that its picture is dropped");
assert.ok(out.inlay.some(([, text]) => /kNm/.test(text)), JSON.stringify(out.inlay));
assert.ok(out.inlay.some(([, text]) => /%/.test(text)), JSON.stringify(out.inlay));
assert.ok(out.lens.some((title) => /freedoms/.test(title)), JSON.stringify(out.lens));
assert.ok(out.tokens > 500);
assert.ok(out.symbols.length >= 3);
assert.ok(out.folding >= 3);
assert.ok(out.references >= 5);
assert.ok(out.highlights >= 5);
assert.equal(out.definition.length, 1);
assert.equal(out.selection, 1);
assert.ok(["A", "B", "C", "D", "E"].every((n) => out.completion.includes(n)), JSON.stringify(out.completion));
assert.ok(out.signatures.length >= 1);
assert.ok(out.workspaceSymbols.includes("r1"), JSON.stringify(out.workspaceSymbols));
assert.ok(out.actions.some((title) => /column/.test(title)), JSON.stringify(out.actions));
assert.ok(out.renamed);
assert.ok(out.formatted);
assert.match(out.limit, /SLS\./);
assert.ok(out.ok);
console.log("workbench: every provider answers, VS Code", out.version);
