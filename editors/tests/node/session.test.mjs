import assert from "node:assert/strict";
import { after, before, test } from "node:test";
import { Session } from "./session.mjs";

let session;
let uri;
const current = (text) => text.includes("this version");
const names = (list) => list.map((d) => d.code).sort();

before(async () => {
  session = await Session.start();
  uri = await session.open("boathouse.span");
});

after(async () => {
  assert.equal(await session.stop(), 0);
});

const at = (position) => ({ textDocument: { uri }, position });

test("a sound model has no messages", async () => {
  assert.deepEqual(await session.diagnostics(uri), []);
});

test("hovering a support gives reactions of this version", async () => {
  const text = await session.hover(uri, session.place(uri, "A pinned"), current);
  assert.match(text, /Fz/);
  assert.match(text, /kN/);
  assert.match(text, /ULS/);
});

test("hovering a member gives what governs, with a diagram", async () => {
  const text = await session.hover(uri, session.place(uri, "r1", { from: "beam r1" }), current);
  assert.match(text, /My/);
  assert.match(text, /IPE 300/);
  assert.match(text, /[▁▂▃▄▅▆▇█]/);
});

test("an error is seen, and goes when it is mended", async () => {
  await session.replace(uri, "beam c1  = A -> B", "beam c1  = A -> Bee");
  const list = await session.diagnostics(uri, (l) => l.length > 0);
  assert.deepEqual(names(list), ["unknown-name"]);
  assert.match(await session.hover(uri, session.place(uri, "A pinned")), /last version that solved/);
  await session.replace(uri, "Bee", "B");
  assert.deepEqual(await session.diagnostics(uri, (l) => l.length === 0), []);
});

test("reactions follow the text", async () => {
  const place = () => session.place(uri, "A pinned");
  const before = await session.hover(uri, place(), current);
  await session.replace(uri, "0.35 kN/m2", "3.5 kN/m2");
  const after = await session.hover(uri, place(), (text) => current(text) && text !== before);
  assert.notEqual(after, before);
  await session.replace(uri, "3.5 kN/m2", "0.35 kN/m2");
  const numbers = (text) => text.split("\n").filter((line) => line.startsWith("|")).join("\n");
  const again = await session.hover(uri, place(), (text) => current(text) && numbers(text) === numbers(before));
  assert.equal(numbers(again), numbers(before));
});

test("a broken limit is told, with the combination that governs", async () => {
  await session.replace(uri, "length/250 under SLS", "length/2500 under SLS");
  const list = await session.diagnostics(uri, (l) => l.length > 0);
  assert.deepEqual(names(list), ["limit-exceeded"]);
  assert.match(list[0].message, /SLS\./);
  await session.replace(uri, "length/2500", "length/250");
  await session.diagnostics(uri, (l) => l.length === 0);
});

test("completion offers nodes after an arrow, and units of the right dimension", async () => {
  const labels = (answer) => (answer.items ?? answer).map((i) => i.label);
  const nodes = labels(await session.request("textDocument/completion", at(session.place(uri, "A -> ", { after: true, from: "beam c1" }))));
  for (const n of ["A", "B", "C", "D", "E"]) {
    assert.ok(nodes.includes(n), `${n} in ${nodes}`);
  }
  assert.ok(!nodes.includes("r1"), `${nodes}`);
  const statements = labels(await session.request("textDocument/completion", at({ line: 0, character: 0 })));
  assert.ok(statements.length >= 0);
});

test("definition and references meet", async () => {
  const use = session.place(uri, "B", { from: "beam c1" });
  const where = await session.request("textDocument/definition", at(use));
  const target = Array.isArray(where) ? where[0] : where;
  const range = target.range ?? target.targetSelectionRange;
  assert.deepEqual(range.start, session.place(uri, "B", { from: "node B" }));
  const references = await session.request("textDocument/references", { ...at(use), context: { includeDeclaration: true } });
  const written = session.text(uri).match(/\bB\b(?=[^"]*$)/gm);
  assert.ok(references.length >= 5 && written.length >= references.length, `${references.length}`);
});

test("a rename goes through, and back", async () => {
  const original = session.text(uri);
  for (const [piece, name] of [["B ", "ridge_beam_end"], ["ridge_beam_end", "B"]]) {
    const position = session.place(uri, piece, { from: "node " + piece });
    assert.ok(await session.request("textDocument/prepareRename", at(position)));
    const edit = await session.request("textDocument/rename", { ...at(position), newName: name });
    const edits = edit.documentChanges ? edit.documentChanges.flatMap((c) => c.edits) : edit.changes[uri];
    await session.apply(uri, edits);
    await session.diagnostics(uri, (l) => l.length === 0);
  }
  assert.equal(session.text(uri), original);
});

test("formatting changes only what is badly laid out", async () => {
  const original = session.text(uri);
  const format = () => session.request("textDocument/formatting", { textDocument: { uri }, options: { tabSize: 4, insertSpaces: true } });
  assert.deepEqual((await format()) ?? [], []);
  await session.replace(uri, "node A  = (0, 0) m", "node A=(0,0)m");
  const edits = await format();
  assert.ok(edits.every((e) => e.range.start.line === session.place(uri, "node A").line), JSON.stringify(edits));
  await session.apply(uri, edits);
  assert.equal(session.text(uri), original);
});

test("hints stand beside supports, members and limits", async () => {
  const lines = session.text(uri).split("\n").length;
  const range = { start: { line: 0, character: 0 }, end: { line: lines, character: 0 } };
  const hints = await session.request("textDocument/inlayHint", { textDocument: { uri }, range });
  const on = (line) => hints.filter((h) => h.position.line === line).map((h) => (typeof h.label === "string" ? h.label : h.label.map((p) => p.value).join("")));
  assert.match(on(session.place(uri, "support A").line).join(), /kN/);
  assert.match(on(session.place(uri, "beam r1").line).join(), /kNm/);
  assert.match(on(session.place(uri, "limit deflection").line).join(), /%/);
});

test("symbols, folding, tokens, lenses, links answer", async () => {
  const textDocument = { uri };
  const symbols = await session.request("textDocument/documentSymbol", { textDocument });
  assert.ok(JSON.stringify(symbols).includes('"r1"'));
  assert.ok((await session.request("textDocument/foldingRange", { textDocument })).length >= 3);
  const tokens = await session.request("textDocument/semanticTokens/full", { textDocument });
  assert.equal(tokens.data.length % 5, 0);
  assert.ok(tokens.data.length > 500);
  assert.ok((await session.request("textDocument/codeLens", { textDocument })).length >= 2);
  const jetty = await session.open("jetty.span");
  await session.diagnostics(jetty);
});

test("a fix mends a misspelt name", async () => {
  await session.replace(uri, "of column", "of colum", { from: "beam c1" });
  const [diagnostic] = await session.diagnostics(uri, (l) => l.length === 1);
  const actions = await session.request("textDocument/codeAction", { textDocument: { uri }, range: diagnostic.range, context: { diagnostics: [diagnostic] } });
  const fix = actions.find((a) => a.isPreferred) ?? actions[0];
  assert.ok(fix, "no action");
  const edit = fix.edit ?? (await session.request("codeAction/resolve", fix)).edit;
  await session.apply(uri, edit.documentChanges ? edit.documentChanges[0].edits : edit.changes[uri]);
  await session.diagnostics(uri, (l) => l.length === 0);
  assert.match(session.text(uri), /beam c1 +=.* of column\n/);
});

test("a mechanism is explained, and a fix stops it", async () => {
  const original = session.text(uri);
  await session.replace(uri, "support A pinned", "support A holds uz");
  await session.replace(uri, "support E pinned", "support E holds uz");
  const list = await session.diagnostics(uri, (l) => l.some((d) => d.code === "mechanism"));
  const diagnostic = list.find((d) => d.code === "mechanism");
  assert.match(diagnostic.message, /ux/);
  const text = await session.hover(uri, session.place(uri, "A holds uz"));
  assert.match(text, /No numbers/);
  await session.replace(uri, "support A holds uz", "support A pinned");
  await session.replace(uri, "support E holds uz", "support E pinned");
  await session.diagnostics(uri, (l) => l.length === 0);
  assert.equal(session.text(uri), original);
});

test("five broken lines among forty give five messages, and the others still answer", async () => {
  const lines = session.text(uri).trimEnd().split("\n");
  assert.ok(lines.length >= 40);
  const broken = ["beam = A -> B", "node N1 (1, 2) m", "let a = 3 m +", "suport A pinned", "material odd = {"];
  for (const [i, line] of broken.entries()) {
    lines.splice(11 + 4 * i, 0, line);
  }
  const other = await session.open("broken.span", lines.join("\n") + "\n");
  const list = await session.diagnostics(other, (l) => l.length > 0);
  const places = list.filter((d) => d.severity === 1).map((d) => d.range.start.line);
  assert.deepEqual(places, broken.map((line) => lines.indexOf(line)), JSON.stringify(list, null, 1));
  const textDocument = { uri: other };
  assert.match(await session.hover(other, session.place(other, "r1", { from: "beam r1" })), /IPE 300/);
  const offered = await session.request("textDocument/completion", { textDocument, position: session.place(other, "A -> ", { after: true, from: "beam c1" }) });
  assert.ok(offered.items.some((i) => i.label === "B"));
  await session.replace(other, "node A  = (0, 0) m", "node A=(0,0)m");
  const edits = await session.request("textDocument/formatting", { textDocument, options: { tabSize: 4, insertSpaces: true } });
  await session.apply(other, edits);
  assert.match(session.text(other), /^node A +=\s\(0, 0\) m$/m);
  for (const line of broken) {
    assert.ok(session.text(other).includes("\n" + line + "\n"), line);
  }
});
