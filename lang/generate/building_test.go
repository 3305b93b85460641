package generate_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/generate"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

func TestBuildingIsAModel(t *testing.T) {
	b := generate.Hundred
	r := resolve.Model(syntax.Parse(source.New("/b.span", b.Text())), nil)
	require.Empty(t, r.Diagnostics)
	assert.Len(t, r.Model.Members, b.Members())
	assert.Len(t, r.Model.Combinations, 20)
	assert.Greater(t, generate.TenThousand.Members(), 10_000)
}
