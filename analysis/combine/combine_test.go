package combine

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
)

// cased makes a model with cases written as "G permanent", "Q imposed B".
func cased(t testing.TB, cases ...string) *model.Model {
	t.Helper()
	m := &model.Model{}
	for _, text := range cases {
		words := strings.Fields(text)
		c := model.Case{Name: words[0], Kind: -1}
		for k := model.Permanent; k <= model.Earthquake; k++ {
			if k.String() == words[1] {
				c.Kind = k
			}
		}
		require.GreaterOrEqual(t, int(c.Kind), 0, text)
		if len(words) > 2 {
			c.Category = words[2][0]
		}
		m.Cases = append(m.Cases, c)
	}
	return m
}

func family(m *model.Model, name string, code model.Code, s model.Situation, rule string, overrides ...model.Override) {
	m.Families = append(m.Families, model.Family{Name: name, Code: code, Situation: s, Rule: rule, Overrides: overrides})
}

// effects returns the sum of factored effects of each combination by name.
func effects(t testing.TB, m *model.Model, effect map[string]float64) map[string]float64 {
	t.Helper()
	set, problems := Expand(m)
	require.Empty(t, problems)
	sums := map[string]float64{}
	for _, c := range set.All {
		sum := 0.0
		for _, f := range c.Factors {
			sum += f.Factor * effect[m.Cases[f.Case].Name]
		}
		sums[c.Name] = sum
	}
	return sums
}

func words(t testing.TB, m *model.Model) []string {
	t.Helper()
	set, problems := Expand(m)
	require.Empty(t, problems)
	var list []string
	for _, c := range set.All {
		list = append(list, fmt.Sprintf("%s = %s", c.Name, c.Words(m)))
	}
	return list
}

// EN 1990:2002, expressions 6.10, 6.10a, 6.10b, 6.14b, 6.15b, 6.16b with tables
// A1.1 and A1.2(B); effects in kN of an invented building.
func TestEN1990AgainstTheExpressions(t *testing.T) {
	m := cased(t, "G permanent", "Q imposed B", "S snow", "W wind")
	family(m, "U", model.EN1990, model.Strength, "")
	family(m, "V", model.EN1990, model.Strength, "6.10a/b")
	family(m, "C", model.EN1990, model.Characteristic, "")
	family(m, "F", model.EN1990, model.Frequent, "")
	family(m, "P", model.EN1990, model.QuasiPermanent, "")
	got := effects(t, m, map[string]float64{"G": 120, "Q": 80, "S": 25, "W": 30})
	for name, want := range map[string]float64{
		"U.Q+S+W":   327.75,
		"U.S+Q+W":   310.5,
		"U.W+Q+S":   309.75,
		"U.G":       162,
		"U.G−":      120,
		"V.a.Q+S+W": 291.75,
		"V.b.Q+S+W": 303.45,
		"V.b.S+Q+W": 286.2,
		"V.b.W+Q+S": 285.45,
		"V.a.G":     162,
		"C.Q+S+W":   230.5,
		"C.S+Q+W":   219,
		"C.W+Q+S":   218.5,
		"F.Q":       160,
		"F.S+Q":     149,
		"F.W+Q":     150,
		"P.Q":       144,
		"P.G":       120,
	} {
		require.Contains(t, got, name)
		assert.InEpsilon(t, want, got[name], 1e-12, name)
	}
}

// EN 1990 tables A1.2(A) and A1.2(B): uplift.
func TestEN1990Uplift(t *testing.T) {
	m := cased(t, "G permanent", "W wind")
	family(m, "S", model.EN1990, model.Strength, "")
	family(m, "E", model.EN1990, model.Strength, "EQU")
	got := effects(t, m, map[string]float64{"G": 40, "W": -55})
	assert.InDelta(t, -42.5, got["S.W−"], 1e-12)
	assert.InDelta(t, -46.5, got["E.W−"], 1e-12)
	assert.Contains(t, words(t, m), "E.W− = 0.9 G + 1.5 W")
}

// EN 1990 table A1.1.
func TestEN1990PsiTable(t *testing.T) {
	for _, c := range []struct {
		action   Action
		highSnow bool
		want     Psi
	}{
		{imposedOf('A'), false, Psi{0.7, 0.5, 0.3}},
		{imposedOf('B'), false, Psi{0.7, 0.5, 0.3}},
		{imposedOf('C'), false, Psi{0.7, 0.7, 0.6}},
		{imposedOf('D'), false, Psi{0.7, 0.7, 0.6}},
		{imposedOf('E'), false, Psi{1.0, 0.9, 0.8}},
		{imposedOf('F'), false, Psi{0.7, 0.7, 0.6}},
		{imposedOf('G'), false, Psi{0.7, 0.5, 0.3}},
		{imposedOf('H'), false, Psi{0, 0, 0}},
		{snow, false, Psi{0.5, 0.2, 0}},
		{snow, true, Psi{0.7, 0.5, 0.2}},
		{wind, true, Psi{0.6, 0.2, 0}},
		{thermal, false, Psi{0.6, 0.5, 0}},
	} {
		assert.Equal(t, c.want, PsiOf(c.action, c.highSnow), c.action.String())
	}
}

// ASCE/SEI 7-16, 2.3.1 and 2.4.1; effects in kip of an invented building.
func TestASCE716(t *testing.T) {
	m := cased(t, "D permanent", "L imposed B", "Lr imposed H", "S snow", "W wind")
	family(m, "U", model.ASCE7, model.Strength, "")
	family(m, "A", model.ASCE7, model.Allowable, "7-16")
	got := effects(t, m, map[string]float64{"D": 100, "L": 60, "Lr": 20, "S": 30, "W": 40})
	for name, want := range map[string]float64{
		"U.D":      140,
		"U.L+S":    231,
		"U.L+Lr":   226,
		"U.S+L":    228,
		"U.S+W":    188,
		"U.Lr+L":   212,
		"U.W+L+S":  235,
		"A.D":      100,
		"A.L":      160,
		"A.S":      130,
		"A.Lr":     120,
		"A.L+S":    167.5,
		"A.W":      124,
		"A.W+L+S":  185.5,
		"A.W+L+Lr": 178,
	} {
		require.Contains(t, got, name)
		assert.InEpsilon(t, want, got[name], 1e-12, name)
	}
	reversed := effects(t, m, map[string]float64{"D": 100, "L": 60, "Lr": 20, "S": 30, "W": -40})
	assert.InEpsilon(t, 50.0, reversed["U.W−"], 1e-12)
	assert.InEpsilon(t, 36.0, reversed["A.W−"], 1e-12)
}

// ASCE/SEI 7-22, 2.3.1 and 2.4.1: snow is given at strength level.
func TestASCE722Snow(t *testing.T) {
	m := cased(t, "D permanent", "L imposed B", "S snow", "W wind")
	family(m, "U", model.ASCE7, model.Strength, "ASCE 7-22")
	family(m, "A", model.ASCE7, model.Allowable, "ASCE 7-22")
	got := effects(t, m, map[string]float64{"D": 100, "L": 60, "S": 48, "W": 40})
	for name, want := range map[string]float64{
		"U.L+S": 230.4, "U.S+L": 228, "U.W+L+S": 234.4, "A.S": 133.6, "A.L+S": 170.2,
	} {
		require.Contains(t, got, name)
		assert.InEpsilon(t, want, got[name], 1e-12, name)
	}
}

func TestNamesAndFactorsInFull(t *testing.T) {
	m := cased(t, "G permanent", "S snow", "W wind")
	family(m, "ULS", model.EN1990, model.Strength, "")
	assert.Equal(t, []string{
		"ULS.G = 1.35 G",
		"ULS.G− = G",
		"ULS.S = 1.35 G + 1.5 S",
		"ULS.S− = G + 1.5 S",
		"ULS.S+W = 1.35 G + 1.5 S + 0.9 W",
		"ULS.S+W− = G + 1.5 S + 0.9 W",
		"ULS.W = 1.35 G + 1.5 W",
		"ULS.W− = G + 1.5 W",
		"ULS.W+S = 1.35 G + 0.75 S + 1.5 W",
		"ULS.W+S− = G + 0.75 S + 1.5 W",
	}, words(t, m))
}

func TestEachPermanentCaseIsASource(t *testing.T) {
	m := cased(t, "G1 permanent", "G2 permanent", "W wind")
	family(m, "ULS", model.EN1990, model.Strength, "")
	assert.Contains(t, words(t, m), "ULS.W−G2 = 1.35 G1 + G2 + 1.5 W")
	assert.Contains(t, words(t, m), "ULS.W− = G1 + G2 + 1.5 W")
	assert.Len(t, words(t, m), 8)

	m.Families[0].Rule = "one-source"
	assert.Equal(t, []string{
		"ULS.G = 1.35 G1 + 1.35 G2", "ULS.G− = G1 + G2",
		"ULS.W = 1.35 G1 + 1.35 G2 + 1.5 W", "ULS.W− = G1 + G2 + 1.5 W",
	}, words(t, m))
}

func TestPartsOfOneActionLeadTogether(t *testing.T) {
	m := cased(t, "Q1 imposed A", "Q2 imposed A", "Q3 imposed E")
	family(m, "C", model.EN1990, model.Characteristic, "")
	assert.ElementsMatch(t, []string{
		"C.Q1+Q2 = Q1 + Q2", "C.Q1 = Q1", "C.Q2 = Q2",
		"C.Q1+Q2+Q3 = Q1 + Q2 + Q3", "C.Q1+Q3 = Q1 + Q3", "C.Q2+Q3 = Q2 + Q3", "C.Q3 = Q3",
		"C.Q3+Q1+Q2 = 0.7 Q1 + 0.7 Q2 + Q3", "C.Q3+Q1 = 0.7 Q1 + Q3", "C.Q3+Q2 = 0.7 Q2 + Q3",
	}, words(t, m))
}

func TestAlternatesNeverMeet(t *testing.T) {
	m := cased(t, "G permanent", "W1 wind", "W2 wind", "S snow")
	m.Alternates = []model.Alternate{{Cases: []int{1, 2}}}
	for _, s := range []model.Situation{model.Strength, model.Characteristic, model.QuasiPermanent, model.Frequent} {
		family(m, "F"+fmt.Sprint(int(s)), model.EN1990, s, "")
	}
	family(m, "A", model.ASCE7, model.Strength, "")
	list := words(t, m)
	assert.Contains(t, list, "F0.W1+S = 1.35 G + 1.5 W1 + 0.75 S")
	for _, line := range list {
		assert.False(t, strings.Contains(line, "W1") && strings.Contains(line, "W2"), line)
	}
}

func TestOfAlternatePermanentCasesOneActs(t *testing.T) {
	m := cased(t, "G permanent", "Old permanent", "New permanent", "S snow")
	m.Alternates = []model.Alternate{{Cases: []int{1, 2}}}
	family(m, "C", model.EN1990, model.Characteristic, "")
	assert.ElementsMatch(t, []string{
		"C.G+New = G + New", "C.G+Old = G + Old",
		"C.S+New = G + New + S", "C.S+Old = G + Old + S",
	}, words(t, m))
}

// EN 1991-1-1, 3.3.2(1).
func TestImposedRoofLoadNeverMeetsSnowOrWind(t *testing.T) {
	m := cased(t, "G permanent", "R imposed H", "S snow", "W wind", "Q imposed A")
	family(m, "ULS", model.EN1990, model.Strength, "")
	list := words(t, m)
	assert.Contains(t, list, "ULS.R+Q = 1.35 G + 1.5 R + 1.05 Q")
	for _, line := range list {
		sum := line[strings.Index(line, "="):]
		assert.False(t, strings.Contains(sum, "R") && strings.ContainsAny(sum, "SW"), line)
	}
}

func TestSettlementComesOrNot(t *testing.T) {
	m := cased(t, "G permanent", "Sink settlement", "S snow")
	family(m, "ULS", model.EN1990, model.Strength, "one-source")
	assert.ElementsMatch(t, []string{
		"ULS.G = 1.35 G", "ULS.G− = G",
		"ULS.G+Sink = 1.35 G + 1.35 Sink", "ULS.G+Sink− = G + 1.35 Sink",
		"ULS.S = 1.35 G + 1.5 S", "ULS.S− = G + 1.5 S",
		"ULS.S+Sink = 1.35 G + 1.35 Sink + 1.5 S", "ULS.S+Sink− = G + 1.35 Sink + 1.5 S",
	}, words(t, m))
}

// EN 1990 expressions 6.11b and 6.12b.
func TestAccidentAndEarthquake(t *testing.T) {
	m := cased(t, "G permanent", "Q imposed C", "W wind", "Crash accidental", "Quake earthquake")
	family(m, "ULS", model.EN1990, model.Strength, "")
	list := words(t, m)
	assert.Contains(t, list, "ULS.Crash = G + Crash")
	assert.Contains(t, list, "ULS.Crash+W+Q = G + 0.6 Q + 0.2 W + Crash")
	assert.Contains(t, list, "ULS.Crash+Q = G + 0.7 Q + Crash")
	assert.Contains(t, list, "ULS.Quake+Q = G + 0.6 Q + Quake")
	for _, line := range list {
		assert.False(t, strings.Contains(line, "Crash") && strings.Contains(line, "Quake"), line)
	}

	m.Families = nil
	family(m, "U", model.ASCE7, model.Strength, "")
	family(m, "A", model.ASCE7, model.Allowable, "")
	list = words(t, m)
	assert.Contains(t, list, "U.Quake+Q = 1.2 G + Q + Quake")
	assert.Contains(t, list, "U.Quake− = 0.9 G + Quake")
	assert.Contains(t, list, "U.Crash+Q− = 0.9 G + 0.5 Q + Crash")
	assert.Contains(t, list, "A.Quake = G + 0.7 Quake")
	assert.Contains(t, list, "A.Quake+Q = G + 0.75 Q + 0.525 Quake")
}

func TestOverrides(t *testing.T) {
	m := cased(t, "G permanent", "Q imposed B", "S snow", "W wind")
	none := func(o model.Override) model.Override { o.Case = -1; return o }
	family(m, "U", model.EN1990, model.Strength, "6.10a/b",
		none(model.Override{Symbol: "gamma", Kind: model.Permanent, Unfavourable: 1.2, Favourable: 0.9}),
		none(model.Override{Symbol: "psi0", Kind: model.Imposed, Unfavourable: 0.6}),
		none(model.Override{Symbol: "psi0", Kind: model.Imposed, Category: 'B', Unfavourable: 0.8}),
		none(model.Override{Symbol: "psi0", Kind: model.Imposed, Category: 'C', Unfavourable: 0.1}),
		model.Override{Symbol: "psi0", Case: 3, Unfavourable: 0.5},
		none(model.Override{Symbol: "xi", Kind: model.Permanent, Unfavourable: 0.925}))
	list := words(t, m)
	assert.Contains(t, list, "U.b.S+Q+W = 1.11 G + 1.2 Q + 1.5 S + 0.75 W")
	assert.Contains(t, list, "U.b.S+Q+W− = 0.9 G + 1.2 Q + 1.5 S + 0.75 W")
	assert.Contains(t, list, "U.a.Q+S+W = 1.2 G + 1.2 Q + 0.75 S + 0.75 W")

	m.Families = nil
	family(m, "A", model.ASCE7, model.Strength, "", none(model.Override{Symbol: "psi0", Kind: model.Imposed, Unfavourable: 0.5}))
	assert.Contains(t, words(t, m), "A.W+Q+S = 1.2 G + 0.5 Q + 0.5 S + W")
	assert.Contains(t, words(t, m), "A.Q+S = 1.2 G + 1.6 Q + 0.5 S")
}

func TestWrittenCombinationsJoinTheirFamily(t *testing.T) {
	m := cased(t, "G permanent", "S snow")
	family(m, "ULS", model.EN1990, model.Strength, "")
	m.Combinations = []model.Combination{
		{Name: "site", Family: -1, Factors: []model.Factor{{Case: 1, Factor: -1}, {Case: 0, Factor: 1}}},
		{Name: "ULS.S", Family: 0, Factors: []model.Factor{{Case: 0, Factor: 1.1}}},
		{Name: "ULS.mine", Family: 0, Factors: []model.Factor{{Case: 1, Factor: 1.5}, {Case: 0, Factor: 1}}},
	}
	assert.Equal(t, []string{
		"site = G − S",
		"ULS.S = 1.1 G",
		"ULS.mine = G + 1.5 S", // what would have been ULS.S−
		"ULS.G = 1.35 G",
		"ULS.G− = G",
		"ULS.S.6_10 = 1.35 G + 1.5 S",
	}, words(t, m))
}

func TestNamesDoNotDependOnOrderOrOtherCases(t *testing.T) {
	few := cased(t, "W wind", "G permanent", "S snow")
	family(few, "ULS", model.EN1990, model.Strength, "6.10a/b")
	many := cased(t, "G permanent", "A imposed A", "S snow", "T thermal", "W wind", "X accidental")
	family(many, "SLS", model.EN1990, model.Characteristic, "")
	family(many, "ULS", model.EN1990, model.Strength, "6.10a/b")
	small, _ := Expand(few)
	large, _ := Expand(many)
	for _, c := range small.All {
		i, ok := large.Find(c.Name)
		require.True(t, ok, c.Name)
		assert.ElementsMatch(t, strings.Split(c.Words(few), " + "), strings.Split(large.All[i].Words(many), " + "), c.Name)
	}
}

func TestFindTakesEverySpelling(t *testing.T) {
	m := cased(t, "G1 permanent", "G2 permanent", "S snow", "W wind")
	family(m, "ULS", model.EN1990, model.Strength, "")
	set, _ := Expand(m)
	for spelt, want := range map[string]string{
		"ULS.S+W": "ULS.S+W", "ULS.S_W": "ULS.S+W", "ULS.W-": "ULS.W−", "ULS.W_low": "ULS.W−",
		"ULS.W−G2": "ULS.W−G2", "ULS.W-G2": "ULS.W−G2", "ULS.W_low_G2": "ULS.W−G2", "ULS.G_low": "ULS.G−",
	} {
		i, ok := set.Find(spelt)
		require.True(t, ok, spelt)
		assert.Equal(t, want, set.All[i].Name)
	}
	for _, wrong := range []string{"", "ULS", "ULS.", "ULS.X", "ULS.W+", "W"} {
		_, ok := set.Find(wrong)
		assert.False(t, ok, wrong)
	}
	for _, c := range set.All {
		assert.Regexp(t, `^[A-Za-z0-9_.]+$`, Spelling(c.Name))
	}
}

func TestSpellingSharedByTwoNamesFindsNeither(t *testing.T) {
	m := cased(t, "A imposed A", "B snow", "A_B wind", "C thermal", "B_C imposed E")
	family(m, "U", model.EN1990, model.Strength, "")
	set, _ := Expand(m)
	i, ok := set.Find("U.A_B")
	require.True(t, ok, "an exact name comes first")
	assert.Equal(t, "U.A_B", set.All[i].Name)
	_, ok = set.Find("U.A_B_C") // A+B_C, A_B+C or A+B+C
	assert.False(t, ok)
	_, ok = set.Find("U.A+B_C")
	assert.True(t, ok)
}

func TestTooManyIsRefusedInWords(t *testing.T) {
	var cases []string
	for i := range 40 {
		cases = append(cases, fmt.Sprintf("Q%d imposed B", i), fmt.Sprintf("G%d permanent", i))
	}
	m := cased(t, cases...)
	family(m, "ULS", model.EN1990, model.Strength, "")
	family(m, "A", model.ASCE7, model.Strength, "")
	m.Combinations = []model.Combination{{Name: "ULS.a", Family: 0, Factors: []model.Factor{{Case: 0, Factor: 1}}}}
	set, problems := Expand(m)
	require.Len(t, problems, 2)
	var tooMany *TooManyError
	require.ErrorAs(t, problems[0], &tooMany)
	assert.Equal(t, 0, tooMany.Family)
	assert.Contains(t, tooMany.Error(), "more than 2000 combinations of 80 cases")
	assert.Len(t, set.All, 1, "what is written stays")
}

func TestWhatACodeDoesNotHaveIsRefused(t *testing.T) {
	m := cased(t, "G permanent")
	family(m, "A", model.ASCE7, model.Frequent, "")
	family(m, "B", model.EN1990, model.Allowable, "")
	family(m, "C", model.EN1990, model.Strength, "6.11")
	family(m, "D", model.EN1990, model.Strength, "EQU, GEO")
	family(m, "E", model.EN1990, model.Strength, "equ, High Snow")
	set, problems := Expand(m)
	require.Len(t, problems, 4)
	for f, p := range problems {
		var rule *RuleError
		require.ErrorAs(t, p, &rule)
		assert.Equal(t, f, rule.Family)
	}
	assert.Contains(t, problems[2].Error(), `no rule "6.11"`)
	assert.Contains(t, problems[3].Error(), "exclude each other")
	assert.NotEmpty(t, set.Families[4])
}

func TestNearNamesAreProposed(t *testing.T) {
	m := cased(t, "G permanent", "Snow snow", "Wind wind")
	family(m, "ULS", model.EN1990, model.Strength, "")
	family(m, "SLS", model.EN1990, model.Characteristic, "")
	set, _ := Expand(m)
	assert.Equal(t, []string{"ULS.Snow_Wind"}, set.Near("ULS.Snw+wind", 1))
	assert.Empty(t, set.Near("ULS.quake", 3))
	assert.Empty(t, set.Near("Snow", 3))
}
