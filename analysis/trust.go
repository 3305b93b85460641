package analysis

import (
	"context"
	"errors"
	"fmt"

	"spanwright/analysis/frame"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
)

// The bounds beyond which a number is reported as doubtful.
const (
	// MaxResidual is that of loads against reactions, relative.
	MaxResidual = 1e-9
	// MaxBackwardError is the componentwise backward error of the solve: how
	// much the stiffnesses and loads would have to change, relative, to make the
	// movements found exact. Rounding alone gives some 1e-16.
	MaxBackwardError = 1e-11
	// MaxCondition is the condition of the scaled stiffness at which movements
	// keep some two digits of sixteen (Golub and Van Loan, Matrix Computations,
	// 4th ed., section 2.6).
	MaxCondition = 1e14
)

// Trust are the numbers that say how good the others are. Each is judged by its
// bound; what is beyond it is among the diagnostics.
type Trust struct {
	Residual      float64 // largest of all states
	BackwardError float64 // largest of all states
	Condition     float64 // of the scaled stiffness, estimated
	// Softest is the relative strain energy of the softest movement that was
	// looked at; 1 where nothing gave cause to look.
	Softest float64
}

// Trust returns how good the numbers are.
func (r *Results) Trust() Trust { return r.trust }

// condition estimates that of the scaled stiffness, or takes it over where the
// factor is the same.
func (r *Results) condition(ctx context.Context, previous *Results) (float64, error) {
	kind := r.solver.Path().Kind
	if previous != nil && previous.solver != nil && (kind == frame.LoadsOnly || kind == frame.Updated) {
		return previous.trust.Condition, nil
	}
	return r.solver.Condition(ctx)
}

// audit notes how far the stiffness can be trusted, and says so where that is
// not far.
func (r *Results) audit(condition float64) {
	r.trust.Softest, r.trust.Condition = 1, condition
	if softest := r.solver.Softest(); softest > 0 {
		r.trust.Softest = softest
	}
	switch {
	case r.trust.Softest < frame.Soft:
		r.doubt(diagnostic.SoftStructure, "The structure is close to a mechanism: there is a movement that it hardly resists. Check joints, supports and very small stiffnesses.")
	case r.trust.Condition > MaxCondition:
		r.doubt(diagnostic.IllConditioned, fmt.Sprintf("Very stiff parts stand beside very soft ones: movements may be off in the %s digit (condition %.0e). Check very large and very small stiffnesses and their units.", ordinal(digitsLeft(r.trust.Condition)), r.trust.Condition))
	}
}

// digitsLeft estimates the decimal digits that a condition leaves of sixteen.
func digitsLeft(condition float64) int {
	left := 16
	for ; condition > 1 && left > 1; condition /= 10 {
		left--
	}
	return left
}

func ordinal(n int) string {
	switch n {
	case 1:
		return "first"
	case 2:
		return "second"
	case 3:
		return "third"
	}
	return fmt.Sprintf("%dth", n)
}

// auditStates looks at what was solved.
func (r *Results) auditStates(states []*frame.State) {
	for _, s := range states {
		r.trust.Residual = max(r.trust.Residual, s.Residual())
		r.trust.BackwardError = max(r.trust.BackwardError, s.BackwardError())
	}
	switch {
	case !(r.trust.Residual <= MaxResidual):
		r.doubt(diagnostic.NoEquilibrium, fmt.Sprintf("Loads and reactions do not balance: %.0e of the largest force is left over, more than %.0e. Do not use these results. Check very large and very small stiffnesses and their units.", r.trust.Residual, MaxResidual))
	case !(r.trust.BackwardError <= MaxBackwardError):
		r.doubt(diagnostic.LostDigits, fmt.Sprintf("The movements satisfy the equations to %.0e only. Check very large and very small stiffnesses and their units.", r.trust.BackwardError))
	}
}

func (r *Results) doubt(name diagnostic.Name, words string) {
	r.diagnostics = append(r.diagnostics, about(r.model, r.model.Heading, name, words))
}

// unsolved says why case or combination i has no answer although the structure
// could be solved.
func (r *Results) unsolved(i int, reason error) diagnostic.Diagnostic {
	name, where := r.nameOf(i), r.originOf(i)
	var circling *frame.OneWayError
	var mechanism *frame.MechanismError
	switch {
	case errors.As(reason, &circling):
		return about(r.model, where, diagnostic.OneWayCycling, fmt.Sprintf("%s has no answer: %s.", name, reason))
	case errors.As(reason, &mechanism):
		return about(r.model, where, diagnostic.Mechanism, fmt.Sprintf("Under %s %s", name, closed(reason.Error())))
	}
	return about(r.model, where, diagnostic.CannotSolve, fmt.Sprintf("%s has no answer: %s", name, closed(reason.Error())))
}

// closed ends a text with a full stop.
func closed(text string) string {
	if text != "" && text[len(text)-1] != '.' {
		return text + "."
	}
	return text
}

// nameOf returns the name of case or combination i.
func (r *Results) nameOf(i int) string {
	if i < len(r.model.Cases) {
		return r.model.Cases[i].Name
	}
	return r.set.All[i-len(r.model.Cases)].Name
}

// originOf returns where case or combination i was written; for one that a code
// asks for, its family.
func (r *Results) originOf(i int) model.Origin {
	if i < len(r.model.Cases) {
		return r.model.Cases[i].Origin
	}
	c := &r.set.All[i-len(r.model.Cases)]
	if c.Written >= 0 {
		return r.model.Combinations[c.Written].Origin
	}
	return r.model.Families[c.Family].Origin
}

// sortDiagnostics sorts them, and says what many combinations of a family share
// only once.
func (r *Results) sortDiagnostics() {
	diagnostic.Sort(r.diagnostics)
	kept := r.diagnostics[:0]
	more := 0
	for i, d := range r.diagnostics {
		if i > 0 && d.Name == kept[len(kept)-1].Name && d.File == kept[len(kept)-1].File && d.Subject == kept[len(kept)-1].Subject && d.Subject.End > d.Subject.Start {
			more++
			kept[len(kept)-1].Detail = fmt.Sprintf("And %d more combinations like it.", more)
			continue
		}
		more = 0
		kept = append(kept, d)
	}
	r.diagnostics = kept
}
