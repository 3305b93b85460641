import * as vscode from "vscode";
import { LanguageClient, LanguageClientOptions, ServerOptions, State } from "vscode-languageclient/node";

// The extension only starts the server and hands its commands on. Everything an
// engineer sees is answered by `spanwright serve`.

let client: LanguageClient | undefined;

/** Starts the server of the configured program. */
async function start(): Promise<void> {
  const command = vscode.workspace.getConfiguration("spanwright").get<string>("path", "spanwright");
  const server: ServerOptions = { command, args: ["serve"] };
  const options: LanguageClientOptions = {
    documentSelector: [
      { scheme: "file", language: "span" },
      { scheme: "untitled", language: "span" },
    ],
    // The editor draws SVG pictures in hovers; other clients would show their source.
    initializationOptions: { pictures: true },
  };
  client = new LanguageClient("spanwright", "spanwright", server, options);
  try {
    await client.start();
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    void vscode.window.showErrorMessage(
      `spanwright could not be started as "${command}": ${reason}. Set spanwright.path to the program.`,
    );
  }
}

/** Runs a command of the server on the file and place of the cursor. */
async function run(command: string): Promise<unknown> {
  const editor = vscode.window.activeTextEditor;
  if (!client || client.state !== State.Running || editor?.document.languageId !== "span") {
    void vscode.window.showInformationMessage("Open a .span model first.");
    return undefined;
  }
  const uri = client.code2ProtocolConverter.asUri(editor.document.uri);
  const position = client.code2ProtocolConverter.asPosition(editor.selection.active);
  return client.sendRequest("workspace/executeCommand", { command, arguments: [{ uri, position }] });
}

/** Shows a command's Markdown answer beside the model. */
async function show(command: string): Promise<void> {
  const answer = await run(command);
  if (typeof answer !== "string" || answer === "") {
    return;
  }
  const document = await vscode.workspace.openTextDocument({ language: "markdown", content: answer });
  await vscode.window.showTextDocument(document, { viewColumn: vscode.ViewColumn.Beside, preserveFocus: true, preview: true });
}

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  context.subscriptions.push(
    vscode.commands.registerCommand("spanwright.solve", () => run("spanwright.solveNow")),
    vscode.commands.registerCommand("spanwright.stiffness", () => show("spanwright.showStiffness")),
    vscode.commands.registerCommand("spanwright.restart", async () => {
      await client?.dispose();
      await start();
    }),
  );
  await start();
}

export async function deactivate(): Promise<void> {
  await client?.dispose();
}
