package analysis_test

import (
	"bytes"
	"encoding/json"
	"flag"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var update = flag.Bool("update", false, "write testdata/verification/RESULTS.md anew")

const verification = "../testdata/verification"

// verified is one case of testdata/verification: its README.md says how to read
// the file.
type verified struct {
	ID, Title, Topic, Source string
	Quantities               []expectation
}

// expectation is one value of a case, with where it comes from.
type expectation struct {
	Name                     string
	Model, Case, Combination string
	Family                   string             // with Factors: the family's combination
	Factors                  map[string]float64 // that has just these, by case name
	Query                    *query             // nil: Expressed says why the value is not asked for
	Expressed                string
	Unit                     string
	Per                      float64 // the result is divided by it; 0 stands for 1
	Value, Rtol, Atol        float64
	Reference                string
	Published                *float64
	PublishedTol             float64 `json:"published_tol"`
	Note                     string
}

// answer is an expectation with what the engine said.
type answer struct {
	expectation
	got float64
}

// TestVerification meets every value of the check cases, and every printed value
// within the rounding of its print.
func TestVerification(t *testing.T) {
	solved := models{t: t, folder: verification, known: map[string]*solvedModel{}}
	var page strings.Builder
	page.WriteString(resultsHead)
	for _, c := range readCases(t) {
		var answers []answer
		t.Run(c.ID, func(t *testing.T) {
			for _, e := range c.Quantities {
				if e.Query == nil {
					require.NotEmpty(t, e.Expressed, "%s says neither what to ask nor why not", e.Name)
					continue
				}
				got := solved.value(t, e)
				answers = append(answers, answer{e, got})
				assert.InDelta(t, e.Value, got, e.tolerance(), "%s: %s", e.Model, e.Name)
				if e.Published != nil {
					assert.InDelta(t, *e.Published, got, e.PublishedTol, "%s: %s as printed", e.Model, e.Name)
				}
			}
		})
		writeCase(&page, c, answers)
	}
	if t.Failed() {
		return
	}
	compareOrUpdate(t, filepath.Join(verification, "RESULTS.md"), page.String())
}

// tolerance is what the result may be off by, in the value's unit.
func (e expectation) tolerance() float64 { return e.Rtol*math.Abs(e.Value) + e.Atol }

func readCases(t *testing.T) []verified {
	paths, err := filepath.Glob(filepath.Join(verification, "*.json"))
	require.NoError(t, err)
	require.NotEmpty(t, paths)
	cases := make([]verified, len(paths))
	for i, path := range paths {
		text, err := os.ReadFile(path)
		require.NoError(t, err)
		decoder := json.NewDecoder(bytes.NewReader(text))
		decoder.DisallowUnknownFields()
		require.NoError(t, decoder.Decode(&cases[i]), path)
		require.NotEmpty(t, cases[i].Quantities, path)
	}
	return cases
}

const resultsHead = `# Results of the check cases

Written by ` + "`go test ./analysis -run TestVerification -update`" + ` and checked by the same test: not for editing.
Values are in the signs of the model language; README.md says how to read the cases. The difference is relative.
`

// writeCase adds the table of a case, with no more digits than every machine
// gives alike.
func writeCase(page *strings.Builder, c verified, answers []answer) {
	fmt.Fprintf(page, "\n## %s %s\n\n%s\n", c.ID, c.Title, c.Source)
	if len(answers) > 0 {
		page.WriteString("\n| model | quantity | unit | reference | printed | result | difference |\n|---|---|---|---:|---:|---:|---:|\n")
	}
	for _, a := range answers {
		printed := ""
		if a.Published != nil {
			printed = rounded(*a.Published, digits)
		}
		// A value half-way between two roundings is to fall on the same side on
		// every machine: away from zero.
		result := rounded(a.got*(1+1e-11), a.digits())
		if a.Value == 0 && math.Abs(a.got) <= a.Atol {
			result = "0"
		}
		fmt.Fprintf(page, "| %s | %s | %s | %s | %s | %s | %s |\n", strings.TrimSuffix(a.Model, ".span"),
			strings.ReplaceAll(a.Name, "|", "\\|"), a.Unit, rounded(a.Value, digits), printed, result, a.difference())
	}
	for _, e := range c.Quantities {
		if e.Query == nil {
			fmt.Fprintf(page, "\nNot asked: %s. %s.\n", e.Name, e.Expressed)
		}
	}
}

// difference is relative. Below a tolerance of 1e-6 it is rounding, which
// differs from machine to machine, and only said to be below the tolerance.
func (a answer) difference() string {
	if a.Value == 0 {
		return "0"
	}
	off := math.Abs(a.got-a.Value) / math.Abs(a.Value)
	if a.Rtol <= 1e-6 && off <= a.Rtol {
		return "< " + strconv.FormatFloat(a.Rtol, 'e', 0, 64)
	}
	return strconv.FormatFloat(off, 'e', 0, 64)
}

// digits is the number of significant digits that the page shows.
const digits = 8

// digits leaves out what an ill-conditioned case cannot promise.
func (a answer) digits() int {
	if a.Rtol <= 1e-9 {
		return digits
	}
	return 5
}

func rounded(x float64, significant int) string { return strconv.FormatFloat(x, 'g', significant, 64) }

// compareOrUpdate holds a written page against the one in the repository, or
// writes it there.
func compareOrUpdate(t *testing.T, path, text string) {
	t.Helper()
	if *update {
		require.NoError(t, os.WriteFile(path, []byte(text), 0o644))
		return
	}
	kept, err := os.ReadFile(path)
	require.NoError(t, err, "write it with -update")
	assert.Equal(t, strings.ReplaceAll(string(kept), "\r\n", "\n"), text, "%s is out of date; write it with -update", path)
}
