// A session with `spanwright serve` through VS Code's protocol library.
import { spawn } from "node:child_process";
import { readFileSync } from "node:fs";
import { fileURLToPath, pathToFileURL } from "node:url";
import protocol from "vscode-languageserver-protocol/node";

const { createProtocolConnection, StreamMessageReader, StreamMessageWriter } = protocol;

const program = process.env.SPANWRIGHT ?? "spanwright";
export const folder = fileURLToPath(new URL("../../../testdata/models/", import.meta.url));

/** What the client says that it can do: about what VS Code says. */
const capabilities = {
  general: { positionEncodings: ["utf-16"] },
  window: { workDoneProgress: true },
  workspace: {
    configuration: true,
    workspaceFolders: true,
    applyEdit: true,
    workspaceEdit: { documentChanges: true },
    inlayHint: { refreshSupport: true },
    codeLens: { refreshSupport: true },
    semanticTokens: { refreshSupport: true },
  },
  textDocument: {
    synchronization: { didSave: true },
    hover: { contentFormat: ["markdown", "plaintext"] },
    completion: { completionItem: { snippetSupport: true, documentationFormat: ["markdown"], resolveSupport: { properties: ["documentation", "detail"] } } },
    codeAction: { codeActionLiteralSupport: { codeActionKind: { valueSet: ["quickfix", "refactor", "source"] } }, dataSupport: true, resolveSupport: { properties: ["edit"] } },
    rename: { prepareSupport: true },
    documentSymbol: { hierarchicalDocumentSymbolSupport: true },
    publishDiagnostics: { versionSupport: true, relatedInformation: true, dataSupport: true },
    inlayHint: {},
    semanticTokens: { requests: { full: { delta: true }, range: true }, tokenTypes: [], tokenModifiers: [], formats: ["relative"] },
  },
};

export class Session {
  static async start(settings = {}) {
    const child = spawn(program, ["serve"], { stdio: ["pipe", "pipe", "inherit"] });
    const session = new Session(child);
    session.connection.onRequest("workspace/configuration", ({ items }) => items.map(() => settings));
    const { capabilities: offered, serverInfo } = await session.request("initialize", {
      processId: process.pid,
      rootUri: pathToFileURL(folder).href,
      workspaceFolders: [{ uri: pathToFileURL(folder).href, name: "models" }],
      capabilities,
    });
    session.offered = offered;
    session.serverInfo = serverInfo;
    await session.connection.sendNotification("initialized", {});
    return session;
  }

  constructor(child) {
    this.child = child;
    this.published = new Map(); // by URI: every publish in order
    this.refreshed = 0;
    this.documents = new Map();
    this.exit = new Promise((resolve) => child.on("exit", resolve));
    this.connection = createProtocolConnection(new StreamMessageReader(child.stdout), new StreamMessageWriter(child.stdin));
    this.connection.onNotification("textDocument/publishDiagnostics", (message) => {
      const list = this.published.get(message.uri) ?? [];
      list.push(message);
      this.published.set(message.uri, list);
    });
    for (const method of ["client/registerCapability", "client/unregisterCapability", "window/workDoneProgress/create"]) {
      this.connection.onRequest(method, () => null);
    }
    for (const what of ["inlayHint", "codeLens", "semanticTokens", "diagnostic"]) {
      this.connection.onRequest(`workspace/${what}/refresh`, () => {
        this.refreshed++;
        return null;
      });
    }
    this.connection.listen();
  }

  request(method, params) {
    return this.connection.sendRequest(method, params);
  }

  /** Opens a shipped model under its own name, or a text under a new one. */
  async open(name, text = readFileSync(folder + name, "utf8")) {
    const uri = pathToFileURL(folder + name).href;
    this.documents.set(uri, { version: 1, text });
    await this.connection.sendNotification("textDocument/didOpen", { textDocument: { uri, languageId: "span", version: 1, text } });
    return uri;
  }

  text(uri) {
    return this.documents.get(uri).text;
  }

  /** The place of a piece of text; at its end with after. */
  place(uri, piece, { after = false, from = "" } = {}) {
    const text = this.text(uri);
    const start = from === "" ? 0 : text.indexOf(from);
    const at = text.indexOf(piece, start);
    if (start < 0 || at < 0) {
      throw new Error(`no ${JSON.stringify(piece)} in the text`);
    }
    return this.position(uri, at + (after ? piece.length : 0));
  }

  position(uri, offset) {
    const before = this.text(uri).slice(0, offset).split("\n");
    return { line: before.length - 1, character: before.at(-1).length };
  }

  offset(uri, { line, character }) {
    const lines = this.text(uri).split("\n");
    return lines.slice(0, line).reduce((sum, l) => sum + l.length + 1, 0) + character;
  }

  /** Types: replaces the first place of a piece of text. */
  async replace(uri, piece, by, options) {
    const start = this.place(uri, piece, options);
    const end = this.position(uri, this.offset(uri, start) + piece.length);
    await this.apply(uri, [{ range: { start, end }, newText: by }]);
  }

  /** Applies edits of one version, as a client does with an answer. */
  async apply(uri, edits) {
    const document = this.documents.get(uri);
    const sorted = edits
      .map((e) => ({ ...e, from: this.offset(uri, e.range.start), to: this.offset(uri, e.range.end) }))
      .sort((a, b) => b.from - a.from);
    for (const e of sorted) {
      document.text = document.text.slice(0, e.from) + e.newText + document.text.slice(e.to);
    }
    document.version++;
    await this.connection.sendNotification("textDocument/didChange", {
      textDocument: { uri, version: document.version },
      contentChanges: sorted.map((e) => ({ range: e.range, text: e.newText })),
    });
  }

  /** The latest diagnostics of the present version, once they satisfy wanted. */
  async diagnostics(uri, wanted = () => true) {
    const deadline = Date.now() + 20_000;
    let latest;
    while (Date.now() < deadline) {
      latest = this.published.get(uri)?.at(-1);
      if (latest && latest.version === this.documents.get(uri).version && wanted(latest.diagnostics)) {
        return latest.diagnostics;
      }
      await new Promise((resolve) => setTimeout(resolve, 10));
    }
    throw new Error("diagnostics never came; the last ones: " + JSON.stringify(latest, null, 1));
  }

  /** The hover at a place as text, once it satisfies wanted. */
  async hover(uri, position, wanted = () => true) {
    const deadline = Date.now() + 20_000;
    let text;
    while (Date.now() < deadline) {
      const hover = await this.request("textDocument/hover", { textDocument: { uri }, position });
      text = hover?.contents?.value ?? "";
      if (text !== "" && wanted(text)) {
        return text;
      }
      await new Promise((resolve) => setTimeout(resolve, 10));
    }
    throw new Error("the hover never came; the last one: " + text);
  }

  async stop() {
    await this.request("shutdown");
    await this.connection.sendNotification("exit");
    const code = await this.exit;
    this.connection.dispose();
    return code;
  }
}
