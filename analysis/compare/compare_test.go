package compare

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// folder loads used files from disk.
type folder struct{}

func (folder) Load(path string) (*syntax.Tree, error) {
	text, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(path, string(text))), nil
}

// solvedSide solves a text.
func solvedSide(t *testing.T, text string) Side {
	t.Helper()
	r := resolve.Model(syntax.Parse(source.New("../../testdata/models/model.span", text)), folder{})
	require.True(t, r.Complete, "%v", r.Diagnostics)
	results, err := analysis.Run(context.Background(), r.Model, nil)
	require.NoError(t, err)
	return Side{r.Model, results}
}

func comparison(t *testing.T, old, now string) *Comparison {
	t.Helper()
	c, err := Of(context.Background(), solvedSide(t, old), solvedSide(t, now), Options{})
	require.NoError(t, err)
	return c
}

func shipped(t *testing.T, name string) string {
	text, err := os.ReadFile(filepath.Join("../../testdata/models", name+".span"))
	require.NoError(t, err)
	return string(text)
}

// TestEqualModels holds every shipped model against itself, turned upside down.
func TestEqualModels(t *testing.T) {
	for _, name := range []string{"boathouse", "jetty", "slipway", "lookout", "clubroom"} {
		text := shipped(t, name)
		c := comparison(t, text, text)
		assert.Empty(t, c.Changes, name)
		assert.Empty(t, c.Effects, name)
		assert.Empty(t, c.Limits, name)
	}
}

func TestSpellingOrderAndUnitsDoNotCount(t *testing.T) {
	old := shipped(t, "boathouse")
	now := strings.NewReplacer("eaves   = 4.2 m", "eaves = 4200 mm", "bay     = 5 m", "bay = 500 cm", "4.5 kN/m to 3 kN/m", "4500 N/m to 3000 N/m").Replace(old)
	lines := strings.Split(now, "\n")
	for i, line := range lines { // a declaration may stand anywhere
		if strings.HasPrefix(line, "node A") {
			lines[i], lines[len(lines)-1] = "", line
		}
	}
	c := comparison(t, old, strings.Join(lines, "\n"))
	assert.Empty(t, c.Changes)
	assert.Empty(t, c.Effects)
}

func TestRenamesAreFollowed(t *testing.T) {
	old := shipped(t, "boathouse")
	now := strings.NewReplacer("rafter", "girder", " r1", " roof_west", "(r1", "(roof_west").Replace(old)
	now = strings.ReplaceAll(now, "    r1:", "    roof_west:")
	c := comparison(t, old, now)
	require.Len(t, c.Changes, 2, "%+v", c.Changes)
	assert.Equal(t, Change{Way: Renamed, Kind: Section, Word: "section", Name: "girder", OldName: "rafter"}, c.Changes[0])
	assert.Equal(t, Change{Way: Renamed, Kind: MemberKind, Word: "beam", Name: "roof_west", OldName: "r1"}, c.Changes[1])
	assert.Empty(t, c.Effects)
	assert.Empty(t, c.Limits)
}

// TestOneChangeIsOneChange makes one change at a time and checks its words.
func TestOneChangeIsOneChange(t *testing.T) {
	old := shipped(t, "boathouse")
	for _, x := range []struct {
		old, now string
		want     Change
	}{
		{"rafter  = IPE 300", "rafter = IPE 330", Change{Way: Changed, Kind: Section, Word: "section", Name: "rafter", Differences: []Difference{{"size", "IPE 300", "IPE 330"}}}},
		{"steel = S275", "steel = S355", Change{Way: Changed, Kind: Material, Word: "material", Name: "steel", Differences: []Difference{{"grade", "S275", "S355"}, {"yield", "275 MPa", "355 MPa"}}}},
		{"support E pinned", "support E fixed", Change{Way: Changed, Kind: Support, Word: "support", Name: "E", Differences: []Difference{{"holds", "pinned", "fixed"}}}},
		{"hinge at C", "hinge at D", Change{Way: Changed, Kind: MemberKind, Word: "beam", Name: "r2", Differences: []Difference{{"first end", "releases My", "rigid"}, {"last end", "rigid", "releases My"}}}},
		{", tension only", "", Change{Way: Changed, Kind: MemberKind, Word: "bar", Name: "t1", Differences: []Difference{{"acts", "tension only", "both ways"}}}},
		{"case S snow", "case S wind", Change{Way: Changed, Kind: Case, Word: "case", Name: "S", Differences: []Difference{{"kind", "snow", "wind"}}}},
		{"by EN1990 characteristic", "by EN1990 frequent", Change{Way: Changed, Kind: Family, Word: "family", Name: "SLS", Differences: []Difference{{"situation", "characteristic", "frequent"}}}},
		{"limit ux at B <= eaves/100", "limit ux at B <= eaves/150", Change{Way: Changed, Kind: Limit, Word: "limit", Name: "ux at B under SLS",
			Differences: []Difference{{"says", "ux at B <= eaves/100 under SLS", "ux at B <= eaves/150 under SLS"}}}},
	} {
		now := strings.Replace(old, x.old, x.now, 1)
		require.NotEqual(t, old, now, x.old)
		c := comparison(t, old, now)
		assert.Equal(t, []Change{x.want}, c.Changes)
	}
}

func TestLoadsAreToldAsRemovedAndAdded(t *testing.T) {
	old := shipped(t, "boathouse")
	c := comparison(t, old, strings.Replace(old, "r2 from 3 m to length: 3 kN/m", "r2 from 3 m to length: 5 kN/m", 1))
	require.Len(t, c.Changes, 2)
	assert.Equal(t, Removed, c.Changes[0].Way)
	assert.Equal(t, Added, c.Changes[1].Way)
	assert.Contains(t, c.Changes[1].What, "r2: ")
	require.NotEmpty(t, c.Effects)
}

// TestWhatItDid makes the tie go and the rafter thinner, as a reviewer fears,
// and checks the effects by what the two results say themselves.
func TestWhatItDid(t *testing.T) {
	old := shipped(t, "boathouse")
	now := strings.Replace(old, "rafter  = IPE 300", "rafter = IPE 270", 1)
	now = strings.Replace(now, "bar  t1  = B -> D    of rod, tension only   # the tie takes the thrust of the rafters\n", "", 1)
	now = strings.Replace(now, "limit axial of t1 <= 100 kN under ULS\n", "", 1)
	a, b := solvedSide(t, old), solvedSide(t, now)
	c, err := Of(context.Background(), a, b, Options{})
	require.NoError(t, err)
	assert.Equal(t, 1, c.NewlyBroken())
	assert.Equal(t, Broken, c.Limits[0].Fate)
	assert.Equal(t, "stress of frame under ULS", c.Limits[0].Text)
	assert.Less(t, c.MassAfter, c.MassBefore)
	for _, e := range c.Effects {
		if e.What == "Fx at A" && e.Family == "ULS" && e.Extreme == "most" {
			before := a.Results.Envelope(0).Reaction(0)[0].Most.Value
			after := b.Results.Envelope(0).Reaction(0)[0].Most.Value
			assert.Equal(t, before, e.Before)
			assert.Equal(t, after, e.After)
			assert.InDelta(t, 100*(after-before)/before, e.Percent(), 1e-9)
			return
		}
	}
	assert.Fail(t, "the thrust is not told", "%+v", c.Effects)
}

func TestAMechanismHasNoEffects(t *testing.T) {
	old := shipped(t, "boathouse")
	now := strings.NewReplacer("support A pinned", "support A holds uz", "support E pinned", "support E holds uz").Replace(old)
	c := comparison(t, old, now)
	assert.True(t, c.NewUnsolved)
	assert.False(t, c.OldUnsolved)
	assert.Len(t, c.Changes, 2)
	assert.Empty(t, c.Effects)
}
