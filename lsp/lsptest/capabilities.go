package lsptest

// Capabilities returns what a client can do that does all that the protocol
// offers. The map is new each time, to be changed with [Set].
func Capabilities() map[string]any {
	yes := map[string]any{"dynamicRegistration": true}
	refresh := map[string]any{"refreshSupport": true}
	markdown := []string{"markdown", "plaintext"}
	return map[string]any{
		"general": map[string]any{},
		"window":  map[string]any{"workDoneProgress": true, "showDocument": map[string]any{"support": true}},
		"workspace": map[string]any{
			"applyEdit":              true,
			"workspaceEdit":          map[string]any{"documentChanges": true},
			"configuration":          true,
			"workspaceFolders":       true,
			"didChangeConfiguration": yes,
			"didChangeWatchedFiles":  map[string]any{"dynamicRegistration": true, "relativePatternSupport": true},
			"inlayHint":              refresh, "diagnostics": refresh, "codeLens": refresh, "semanticTokens": refresh,
		},
		"textDocument": map[string]any{
			"completion": map[string]any{
				"completionItem": map[string]any{
					"snippetSupport": true, "labelDetailsSupport": true, "insertReplaceSupport": true,
					"documentationFormat": markdown,
					"resolveSupport":      map[string]any{"properties": []string{"documentation", "detail"}},
				},
				"completionList": map[string]any{"itemDefaults": []string{"editRange", "data"}},
			},
			"hover": map[string]any{"contentFormat": markdown},
			"signatureHelp": map[string]any{"signatureInformation": map[string]any{
				"documentationFormat":    markdown,
				"parameterInformation":   map[string]any{"labelOffsetSupport": true},
				"activeParameterSupport": true,
			}},
			"publishDiagnostics": map[string]any{
				"relatedInformation": true, "tagSupport": map[string]any{"valueSet": []int{1, 2}},
				"versionSupport": true, "dataSupport": true, "codeDescriptionSupport": true,
			},
			"documentSymbol": map[string]any{"hierarchicalDocumentSymbolSupport": true},
			"rename":         map[string]any{"prepareSupport": true},
			"codeAction": map[string]any{
				"codeActionLiteralSupport": map[string]any{"codeActionKind": map[string]any{"valueSet": []string{"quickfix", "refactor", "source"}}},
				"isPreferredSupport":       true, "disabledSupport": true, "dataSupport": true,
				"resolveSupport": map[string]any{"properties": []string{"edit"}},
			},
			"semanticTokens": map[string]any{
				"requests":       map[string]any{"full": map[string]any{"delta": true}, "range": true},
				"tokenTypes":     []string{"namespace", "type", "class", "enum", "interface", "struct", "typeParameter", "parameter", "variable", "property", "enumMember", "event", "function", "method", "macro", "keyword", "modifier", "comment", "string", "number", "regexp", "operator"},
				"tokenModifiers": []string{"declaration", "definition", "readonly", "static", "deprecated"},
				"formats":        []string{"relative"},
			},
			"inlayHint":     map[string]any{"resolveSupport": map[string]any{"properties": []string{"tooltip"}}},
			"callHierarchy": yes, "typeHierarchy": yes,
			"foldingRange": map[string]any{"lineFoldingOnly": false},
		},
	}
}

// Set changes one capability; the path leads to it through the objects.
func Set(capabilities map[string]any, value any, path ...string) map[string]any {
	at := capabilities
	for _, key := range path[:len(path)-1] {
		next, ok := at[key].(map[string]any)
		if !ok {
			next = map[string]any{}
			at[key] = next
		}
		at = next
	}
	if last := path[len(path)-1]; value == nil {
		delete(at, last)
	} else {
		at[last] = value
	}
	return capabilities
}
