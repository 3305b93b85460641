package catalogue

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestLookupReadsUsualSpellings(t *testing.T) {
	for text, title := range map[string]string{
		"IPE 300": "IPE 300", "IPE300": "IPE 300", "ipe 300": "IPE 300", " Ipe  300 ": "IPE 300", "IPE 300.0": "IPE 300",
		"HEB 200": "HEB 200", "HE 200 B": "HEB 200", "he200b": "HEB 200", "HE 200B": "HEB 200", "HE 100 A": "HEA 100",
	} {
		s, found := Lookup(text)
		if assert.True(t, found, text) {
			assert.Equal(t, title, s.Title, text)
		}
	}
	for _, text := range []string{"", "IPE", "300", "IPE 310", "IPE 3 00", "HE 200", "IPE 300 300", "IPE 300 B"} {
		_, found := Lookup(text)
		assert.False(t, found, text)
	}
}

func TestNearestNamesTheSizesAround(t *testing.T) {
	for _, c := range []struct {
		series, size string
		titles       []string
	}{
		{"IPE", "310", []string{"IPE 300", "IPE 330"}},
		{"ipe", "10", []string{"IPE 80", "IPE 100"}},
		{"HEB", "2000", []string{"HEB 1000", "HEB 900"}},
		{"HE", "210 B", []string{"HEB 200", "HEB 220"}},
		{"QXYZ", "300", nil},
		{"IPE", "", nil},
		{"", "", nil},
	} {
		assert.Equal(t, c.titles, Nearest(c.series, c.size), "%s %s", c.series, c.size)
	}
	require.NotEmpty(t, Nearest("IEP", "300"))
	assert.Equal(t, "IPE 300", Nearest("IEP", "300")[0])
}
