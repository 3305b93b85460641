package main

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// cantilever has EA/L = 200 MN/m, 3EIy/L³ = 0.6 MN/m and EIy/L = 3.2 MNm/rad.
const cantilever = `model "Cantilever" plane
material alloy = { E 200 GPa, G 80 GPa }
section flat = { A 40 cm2, Iy 6400 cm4 } of alloy
node A = (0, 0) m
node B = (4, 0) m
node C = (4, 1) m
beam b = A -> B of flat
link l = B -> C
support A fixed
`

// stiffnessOf runs the command on the cantilever.
func stiffnessOf(t *testing.T, arguments ...string) (status int, out, err string) {
	path := filepath.Join(t.TempDir(), "cantilever.span")
	require.NoError(t, os.WriteFile(path, []byte(cantilever), 0o600))
	var stdout, stderr bytes.Buffer
	status = run(append([]string{"stiffness", path}, arguments...), &terminal{in: &bytes.Buffer{}, out: &stdout, err: &stderr})
	return status, stdout.String(), stderr.String()
}

func TestStiffnessAtANode(t *testing.T) {
	status, out, _ := stiffnessOf(t, "--at", "B")
	assert.Equal(t, statusWell, status)
	assert.Regexp(t, `ux +kN/m +200000 +200000`, out)
	assert.Regexp(t, `uz +kN/m +2400 +600 `, out, "12EI/L³ held, 3EI/L³ free")
	assert.Regexp(t, `ry +kNm/rad +12800 +3200`, out, "4EI/L held, EI/L free")
	_, out, _ = stiffnessOf(t, "--at", "A")
	assert.Regexp(t, `uz +held by the support`, out)
}

func TestStiffnessOfAMember(t *testing.T) {
	status, out, _ := stiffnessOf(t, "--of", "b")
	assert.Equal(t, statusWell, status)
	assert.Regexp(t, `12EIy/L³ +2400 +kN/m`, out)
	assert.Regexp(t, `2EIy/L +6400 +kNm/rad`, out)
	assert.Contains(t, out, "−6EIy/L²")
}

func TestStiffnessAsJSON(t *testing.T) {
	_, out, _ := stiffnessOf(t, "--of", "b", "--json")
	var document documentOfStiffness
	require.NoError(t, json.Unmarshal([]byte(out), &document))
	assert.InEpsilon(t, 2.4e6, float64(document.Member.Own[2][2]), 1e-12)
	assert.Equal(t, "12EIy/L³", document.Member.Names[2][8])
	_, out, _ = stiffnessOf(t, "--at", "A", "--json")
	require.NoError(t, json.Unmarshal([]byte(out), &document))
	assert.Nil(t, document.Node.Direct[0].OthersHeld, "held")
	_, out, _ = stiffnessOf(t, "--at", "B", "--json")
	require.NoError(t, json.Unmarshal([]byte(out), &document))
	assert.Equal(t, []string{"ux", "uz", "ry"}, document.Node.Freedoms)
	assert.InEpsilon(t, 1/0.6e6, *document.Node.Flexibility[1][1], 1e-9)
}

func TestStiffnessOfNothingIsToldInWords(t *testing.T) {
	for _, c := range []struct {
		arguments []string
		words     string
	}{
		{nil, "--at"},
		{[]string{"--at", "B", "--of", "b"}, "--at and --of"},
		{[]string{"--at", "Z"}, "no node called Z"},
		{[]string{"--of", "Z"}, "no member called Z"},
		{[]string{"--of", "l"}, "l is a rigid link"},
	} {
		status, _, err := stiffnessOf(t, c.arguments...)
		assert.Equal(t, statusMisuse, status, c.arguments)
		assert.Contains(t, err, c.words)
	}
}
