package combine

// emit adds what the arrangement under way gives with each arrangement of the
// permanent cases.
func (a *arranger) emit(e *expression) error {
	return a.permanentSet(e, nil, 0)
}

// permanentSet walks through the sets of permanent cases that act, from number
// p of the list on. All act, except that of alternates one acts.
func (a *arranger) permanentSet(e *expression, acting []int, p int) error {
	if p == len(a.permanent) {
		if !a.complete() {
			return nil
		}
		return a.permanentMixtures(e, acting)
	}
	i := a.permanent[p]
	if a.mayAct(i) {
		a.factors[i] = 1
		err := a.permanentSet(e, append(acting[:len(acting):len(acting)], i), p+1)
		a.factors[i] = 0
		if err != nil || len(a.excludes[i]) == 0 {
			return err
		}
	}
	return a.permanentSet(e, acting, p+1)
}

// complete says that no further permanent case could act.
func (a *arranger) complete() bool {
	for _, i := range a.permanent {
		if a.factors[i] == 0 && a.mayAct(i) {
			return false
		}
	}
	return true
}

// maxEither bounds the permanent cases with two factors each, whose mixtures
// are counted in the bits of a number.
const maxEither = 20

// permanentMixtures adds the arrangement under way with each mixture of
// unfavourable and favourable factors of the permanent cases that act.
func (a *arranger) permanentMixtures(e *expression, acting []int) error {
	var either []int // cases with two factors
	for _, i := range acting {
		high, least := a.permanentFactors(i, e)
		a.factors[i] = high
		if high != least {
			either = append(either, i)
		}
	}
	if len(either) > maxEither {
		return errTooMany
	}
	for _, mask := range a.masks(len(either)) {
		if a.steps++; a.steps > maxSteps {
			return errTooMany
		}
		suffix := ""
		for bit, i := range either {
			high, least := a.permanentFactors(i, e)
			a.factors[i] = high
			if mask&(1<<bit) != 0 {
				a.factors[i] = least
				suffix += "−" + a.m.Cases[i].Name
			}
		}
		if e.low || mask != 0 && mask == 1<<len(either)-1 {
			suffix = "−"
		}
		if err := a.add(e, suffix); err != nil {
			return err
		}
	}
	for _, i := range acting {
		a.factors[i] = 1 // as permanentSet left it
	}
	return nil
}

// masks returns the mixtures of n favourable cases as bits: none, all, and
// those between unless the permanent cases are one source.
func (a *arranger) masks(n int) []int {
	all := 1<<n - 1
	list := []int{0}
	if all > 0 {
		list = append(list, all)
	}
	if a.options[ruleOneSource] {
		return list
	}
	for mask := 1; mask < all; mask++ {
		list = append(list, mask)
	}
	return list
}
