package feature

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

func TestSignatures(t *testing.T) {
	for _, x := range []struct{ text, label, parameter string }{
		{"let a = atan2(|)", "atan2(rise, run)", "rise"},
		{"let a = atan2(1 m, |)", "atan2(rise, run)", "run"},
		{"let a = sqrt(abs(3) + |)", "sqrt(x)", "x"},
		{"let a = (1 + 2) |", "let NAME = expression", ""},
		{"case G permanent {\n    r1 from 1 m to |\n}", "MEMBER from 1 m to 3 m: 3 kN/m to 5 kN/m DIRECTION", ""},
		{"case G permanent {\n    r1 at 2 m: |\n}", "MEMBER at 2 m: 4 kN DIRECTION", ""},
		{"beam r = A -> B of s, joint |", "joint My at NODE 12 MNm/rad", ""},
		{"section s = pipe |", "pipe 114.3 x 5 mm of MATERIAL", ""},
		{"support A |", "support NODE fixed | pinned | holds ux uz ry | spring uz 12 kN/mm, options", ""},
	} {
		at := strings.LastIndex(x.text, "|")
		h, ok := SignatureAt(syntax.Parse(source.New("t", x.text[:at]+x.text[at+1:])), at)
		if !assert.True(t, ok, x.text) {
			continue
		}
		s := h.Signatures[h.Active]
		assert.Equal(t, x.label, s.Label, x.text)
		if x.parameter != "" {
			p := s.Parameters[h.Parameter]
			assert.Equal(t, x.parameter, s.Label[p.Start:p.End], x.text)
		}
	}
	_, ok := SignatureAt(syntax.Parse(source.New("t", "# nothing\n")), 3)
	assert.False(t, ok)
}
