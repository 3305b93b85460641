package lang

import (
	"encoding/json"
	"os/exec"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// floors lists the packages of the house, lowest first. A package may import
// only packages that stand above it in this list; those of one line may not
// import each other.
var floors = [][]string{
	{"lang/source", "lang/quantity", "lang/generate"},
	{"lang/diagnostic"},
	{"lang/syntax", "lang/catalogue"},
	{"lang/model"},
	{"lang/resolve"},
	{"fmt"},
	{"analysis/sparse", "analysis/element"},
	{"analysis/frame", "analysis/combine", "analysis/envelope"},
	{"analysis/limit"},
	{"analysis"},
	{"analysis/diagram"},
	{"analysis/compare"},
	{"lsp/protocol"},
	{"lsp/rpc"},
	{"lsp/workspace"},
	{"lsp/feature"},
	{"lsp"},
	{"lsp/lsptest"},
	{"editors"},
	{"cmd/spanwright"},
}

// forbidden are imports that a floor must not have though they stand above it.
var forbidden = map[string][]string{
	"analysis/sparse":  {"lang/"},
	"analysis/element": {"lang/"},
	"analysis/frame":   {"lang/syntax", "lang/resolve", "fmt"},
	"analysis/combine": {"lang/syntax", "lang/resolve", "fmt"},
	"analysis/limit":   {"lang/syntax", "lang/resolve", "fmt"},
	"analysis":         {"lang/syntax", "lang/resolve", "fmt"},
	"lsp/feature":      {"lsp/protocol", "lsp/rpc"},
	"fmt":              {"lang/resolve", "lang/model"},
}

type listed struct {
	ImportPath string
	Imports    []string
}

func TestFloorsAreOneWay(t *testing.T) {
	order := map[string]int{}
	for floor, packages := range floors {
		for _, p := range packages {
			order["spanwright/"+p] = floor
		}
	}
	for _, p := range list(t) {
		if strings.Contains(p.ImportPath, "/internal/") || p.ImportPath == "spanwright/lang" {
			continue
		}
		floor, known := order[p.ImportPath]
		if !assert.True(t, known, "%s has no floor: add it to the list", p.ImportPath) {
			continue
		}
		for _, imported := range p.Imports {
			if !strings.HasPrefix(imported, "spanwright/") || strings.Contains(imported, "/internal/") {
				assert.NotContains(t, imported, "tliron/glsp/server", "%s imports %s", p.ImportPath, imported)
				continue
			}
			assert.Less(t, order[imported], floor, "%s must not import %s", p.ImportPath, imported)
			for _, f := range forbidden[strings.TrimPrefix(p.ImportPath, "spanwright/")] {
				assert.False(t, strings.HasPrefix(strings.TrimPrefix(imported, "spanwright/")+"/", strings.TrimSuffix(f, "/")+"/"),
					"%s must not import %s", p.ImportPath, imported)
			}
		}
	}
}

// list asks the go command for the packages of the module and their imports,
// those of tests aside.
func list(t *testing.T) []listed {
	out, err := exec.Command("go", "list", "-json=ImportPath,Imports", "spanwright/...").Output()
	require.NoError(t, err)
	decoder := json.NewDecoder(strings.NewReader(string(out)))
	var all []listed
	for decoder.More() {
		var p listed
		require.NoError(t, decoder.Decode(&p))
		all = append(all, p)
	}
	require.NotEmpty(t, all)
	return all
}
