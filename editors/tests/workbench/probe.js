// Runs inside the real extension host, asks every provider through the public
// interface, and writes what it got as JSON. It uses no selectors of the page.
const vscode = require("vscode");
const fs = require("fs");

const run = vscode.commands.executeCommand;

/** Waits until a question has an answer that is true. */
async function until(question, what, milliseconds = 20_000) {
  const end = Date.now() + milliseconds;
  for (;;) {
    const answer = await question();
    if (answer) {
      return answer;
    }
    if (Date.now() > end) {
      throw new Error("never: " + what);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** The place of a piece of text. */
function place(document, piece, after = 0) {
  const at = document.getText().indexOf(piece);
  if (at < 0) {
    throw new Error("no " + piece);
  }
  return document.positionAt(at + after);
}

async function replace(editor, piece, by) {
  const start = place(editor.document, piece);
  const end = place(editor.document, piece, piece.length);
  await editor.edit((builder) => builder.replace(new vscode.Range(start, end), by));
}

const label = (hint) => (typeof hint.label === "string" ? hint.label : hint.label.map((part) => part.value).join(""));

async function probe(out) {
  const document = await vscode.workspace.openTextDocument(process.env.SPANWRIGHT_PROBE_FILE);
  const editor = await vscode.window.showTextDocument(document);
  const uri = document.uri;
  const codes = () => vscode.languages.getDiagnostics(uri).map((d) => (typeof d.code === "object" ? d.code.value : d.code));
  out.language = document.languageId;

  const hoverAt = async (position) => (await run("vscode.executeHoverProvider", uri, position)).flatMap((h) => h.contents.map((c) => c.value)).join("\n");
  out.hover = await until(async () => {
    const text = await hoverAt(place(document, "beam r1", 5));
    return text.includes("this version") && text;
  }, "a hover of this version");
  out.hoverLength = out.hover.length;
  out.picture = out.hover.includes("data:image/svg+xml");
  out.hover = out.hover.replace(/\(data:image[^)]*\)/g, "(…)");
  out.inlay = (await run("vscode.executeInlayHintProvider", uri, new vscode.Range(0, 0, 999, 0))).map((h) => [h.position.line, label(h)]);
  out.lens = (await run("vscode.executeCodeLensProvider", uri, 99)).map((l) => l.command && l.command.title);
  out.tokens = (await run("vscode.provideDocumentSemanticTokens", uri)).data.length;
  out.symbols = (await run("vscode.executeDocumentSymbolProvider", uri)).map((s) => s.name);
  out.folding = (await run("vscode.executeFoldingRangeProvider", uri)).length;
  const node = place(document, "node B", 5);
  out.references = (await run("vscode.executeReferenceProvider", uri, node)).length;
  out.highlights = (await run("vscode.executeDocumentHighlights", uri, node)).length;
  out.definition = (await run("vscode.executeDefinitionProvider", uri, place(document, "support A", 8))).map((l) => (l.range ?? l.targetRange).start.line);
  out.selection = (await run("vscode.executeSelectionRangeProvider", uri, [node])).length;
  out.completion = (await run("vscode.executeCompletionItemProvider", uri, place(document, "A -> ", 5))).items.map((i) => (typeof i.label === "string" ? i.label : i.label.label));
  const help = await run("vscode.executeSignatureHelpProvider", uri, place(document, "HEB 200", 0));
  out.signatures = help ? help.signatures.map((s) => s.label) : [];
  out.workspaceSymbols = (await run("vscode.executeWorkspaceSymbolProvider", "r1")).map((s) => s.name);

  await replace(editor, "of column", "of colum");
  await until(() => codes().includes("unknown-name"), "unknown-name");
  const line = place(document, "of colum").line;
  const actions = await run("vscode.executeCodeActionProvider", uri, document.lineAt(line).range, undefined, 99);
  out.actions = actions.map((a) => a.title);
  const fix = actions.find((a) => a.isPreferred && a.edit);
  await vscode.workspace.applyEdit(fix.edit);
  await until(() => codes().length === 0, "no messages after the fix");

  await vscode.workspace.applyEdit(await run("vscode.executeDocumentRenameProvider", uri, place(document, "node C", 5), "apex"));
  await until(() => codes().length === 0, "no messages after the rename");
  out.renamed = /beam r1 .*-> apex/.test(document.getText());

  await replace(editor, document.lineAt(place(document, "node A").line).text, "node A=(0,0)m");
  await run("editor.action.formatDocument");
  out.formatted = /^node A +=\s\(0, 0\) m$/m.test(document.getText());

  await replace(editor, "length/250", "length/2500");
  await until(() => codes().includes("limit-exceeded"), "limit-exceeded");
  out.limit = vscode.languages.getDiagnostics(uri)[0].message;
  out.ok = true;
}

exports.activate = async () => {
  const file = process.env.SPANWRIGHT_PROBE_OUT;
  if (!file) {
    return;
  }
  const out = { version: vscode.version };
  try {
    await probe(out);
  } catch (error) {
    out.error = String(error.stack || error);
  }
  fs.writeFileSync(file + ".part", JSON.stringify(out, null, 1));
  fs.renameSync(file + ".part", file);
};
