package analysis

import (
	"bytes"
	"context"
	"encoding/json"
	"math"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
)

func schema(t testing.TB) *jsonschema.Schema {
	t.Helper()
	parsed, err := jsonschema.UnmarshalJSON(bytes.NewReader(Schema))
	require.NoError(t, err)
	c := jsonschema.NewCompiler()
	require.NoError(t, c.AddResource("results.json", parsed))
	s, err := c.Compile("results.json")
	require.NoError(t, err)
	return s
}

func written(t testing.TB, r *Results, o DocumentOptions) string {
	t.Helper()
	var b strings.Builder
	require.NoError(t, r.WriteJSON(context.Background(), &b, o))
	parsed, err := jsonschema.UnmarshalJSON(strings.NewReader(b.String()))
	require.NoError(t, err)
	require.NoError(t, schema(t).Validate(parsed))
	return b.String()
}

func TestDocumentOfASimpleBeam(t *testing.T) {
	b := simple(t)
	b.limit(model.Limit{Measure: model.Deflection, AtMost: true, Targets: []model.Target{{Member: 0, Bound: 0.012}}, Text: "limit deflection of b <= length/500 under SLS"}, 1)
	b.limit(model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, AtMost: true, Targets: []model.Target{{Member: -1, Bound: 0}}}, 0)
	b.limit(model.Limit{Measure: model.CriticalFactor, Targets: []model.Target{{Member: -1, Bound: 10}}})
	r := run(t, b)
	text := written(t, r, DocumentOptions{Stations: 3})
	assert.Equal(t, text, written(t, run(t, b), DocumentOptions{Stations: 3}), "two runs, the same text")
	assert.NotContains(t, text, "-0,")
	assert.NotContains(t, text, "null,\n   \"governs\": \"SLS", "a plain ratio is a number")

	var d document
	require.NoError(t, json.Unmarshal([]byte(text), &d))
	assert.Equal(t, documentModel{Title: "Test", Plane: true, Nodes: 2, Members: 1, Freedoms: r.Freedoms()}, d.Model)
	assert.Len(t, d.Results, r.Len())
	g := d.Results[0]
	assert.Equal(t, "case", g.Kind)
	assert.Equal(t, map[string]number{"G": 1}, g.Factors)
	assert.InEpsilon(t, 15e3, float64(g.Reactions["A"][2]), 1e-12)
	stations := g.Members["b"].Stations
	require.Len(t, stations, 3)
	assert.InDelta(t, 3, float64(stations[1].At), 1e-15)
	assert.InEpsilon(t, 22.5e3, float64(stations[1].My), 1e-12)
	assert.InEpsilon(t, -15e3, float64(stations[2].Vz), 1e-12, "at the last end the inside counts")
	assert.InEpsilon(t, 5*5e3*math.Pow(6, 4)/384/(210e9*8e-5), float64(g.Members["b"].Extremes["deflection"].Max.Value), 1e-12)

	var found bool
	for _, c := range d.Results {
		if c.Name == "ULS.S+W−" {
			found = true
			assert.Equal(t, "combination", c.Kind)
			assert.Equal(t, "ULS", c.Family)
			assert.Equal(t, map[string]number{"G": 1, "S": 1.5, "W": 0.9}, c.Factors)
		}
	}
	assert.True(t, found)
	assert.InEpsilon(t, 33.75e3, float64(d.Envelopes["ULS"].Reactions["A"]["Fz"].Max.Value), 1e-12)
	assert.Equal(t, "ULS.S", d.Envelopes["ULS"].Reactions["A"]["Fz"].Max.Governs)
	assert.Equal(t, "ULS.S", d.Envelopes["ULS"].Members["b"]["My"].Max.Governs)
	assert.InDelta(t, 3, float64(*d.Envelopes["ULS"].Members["b"]["My"].Max.At), 1e-9)

	require.Len(t, d.Limits, 3)
	assert.Equal(t, 2, d.Limits[0].Line)
	assert.True(t, d.Limits[0].OK)
	assert.Equal(t, "SLS.S", d.Limits[0].Governs)
	assert.Nil(t, d.Limits[1].Ratio, "a broken bound of zero has no share")
	assert.False(t, d.Limits[1].OK)
	assert.NotEmpty(t, d.Limits[2].Problem)
}

func TestDocumentOfAMechanismHasNoResults(t *testing.T) {
	b := simple(t)
	b.m.Supports = nil
	var d document
	require.NoError(t, json.Unmarshal([]byte(written(t, run(t, b), DocumentOptions{})), &d))
	assert.Empty(t, d.Results)
}

func TestDocumentOfSomeResultsAndStations(t *testing.T) {
	r := run(t, simple(t))
	for stations, want := range map[int]int{0: 11, 1: 1, 2: 2, -1: 0} {
		var d document
		require.NoError(t, json.Unmarshal([]byte(written(t, r, DocumentOptions{Stations: stations, Only: []int{2}})), &d))
		require.Len(t, d.Results, 1)
		assert.Equal(t, "W", d.Results[0].Name)
		assert.Len(t, d.Results[0].Members["b"].Stations, want)
	}
}
