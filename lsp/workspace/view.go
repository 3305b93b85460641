package workspace

import (
	"fmt"
	"time"

	"spanwright/lang/resolve"
)

// State says how a model's numbers and its text are related.
type State int

// The states of a view.
const (
	// Unsolved: there has been no solve yet, and none is to come before the text
	// is complete.
	Unsolved State = iota
	// Current: the numbers belong to exactly this text.
	Current
	// Overtaken: the numbers are from before the last edit, and a solve is
	// running or waiting.
	Overtaken
	// Incomplete: the text has errors; the numbers are those of the last version
	// that solved.
	Incomplete
	// Refused: the text is complete and was looked at, and has no numbers, for
	// the reasons in the solution's diagnostics.
	Refused
	// Declined: this version is not solved, for a reason that has nothing to do
	// with the structure. The numbers, if there are any, are older.
	Declined
	// Library: the file belongs to no model, so that there is nothing to solve.
	Library
)

// View is a model at one moment: what the text says, and the numbers that there
// are.
type View struct {
	Snapshot *Snapshot
	// Path is that of the model. Others are further models that use the file
	// that was asked about.
	Path   string
	Others []string
	// Resolved is what the text says. It is never nil.
	Resolved *resolve.Result
	// Solution holds the last good numbers, or the reasons for having none. It is
	// nil where there has been no solve.
	Solution *Solution
	State    State
	// Edits is the number of edits since the text that the numbers belong to.
	Edits int
	// Reason says why the state is Declined.
	Reason string
}

// View returns the model that a file is looked at through.
func (s *Snapshot) View(path string) (View, bool) {
	model := s.ModelOf(path)
	v := View{Snapshot: s, Path: model}
	for _, m := range s.Models(path) {
		if m != model {
			v.Others = append(v.Others, m)
		}
	}
	if v.Resolved = s.Resolve(model); v.Resolved == nil {
		return View{}, false
	}
	v.Solution = s.workspace.solution(model)
	v.Reason = s.workspace.declinedFor(model, v.Resolved)
	v.State = v.state()
	if v.Solution != nil {
		v.Edits = s.workspace.editsSince(model, v.Solution)
	}
	return v, true
}

func (v *View) state() State {
	switch {
	case v.Resolved.Library:
		return Library
	case v.Solution != nil && v.Solution.Resolved == v.Resolved:
		if v.Solution.Numbers() == nil {
			return Refused
		}
		return Current
	case !v.Resolved.Complete && v.Solution != nil && v.Solution.Numbers() != nil:
		return Incomplete
	case !v.Resolved.Complete:
		return Unsolved
	case v.Reason != "":
		return Declined
	default:
		return Overtaken
	}
}

// Words says to the engineer which text the numbers belong to.
func (v *View) Words() string {
	switch v.State {
	case Current:
		return fmt.Sprintf("Solved in %s · this version", duration(v.Solution.Took))
	case Overtaken:
		if v.Solution.Numbers() == nil {
			return "Solving …"
		}
		return "From before the last edit, solving …"
	case Incomplete:
		if v.Edits == 1 {
			return "Model incomplete: shown for the last version that solved, 1 edit ago"
		}
		return fmt.Sprintf("Model incomplete: shown for the last version that solved, %d edits ago", v.Edits)
	case Refused:
		return "No numbers: " + v.Solution.Reason()
	case Declined:
		if v.Solution.Numbers() == nil {
			return "No numbers: " + v.Reason
		}
		return "From an earlier version: " + v.Reason
	case Library:
		return "No numbers: no model uses this file"
	default:
		return "No numbers yet: the model has errors"
	}
}

// duration writes a time to two digits.
func duration(d time.Duration) string {
	switch {
	case d < time.Millisecond:
		return fmt.Sprintf("%d µs", d.Microseconds())
	case d < 10*time.Millisecond:
		return fmt.Sprintf("%.1f ms", float64(d)/float64(time.Millisecond))
	case d < time.Second:
		return fmt.Sprintf("%d ms", d.Milliseconds())
	default:
		return fmt.Sprintf("%.1f s", d.Seconds())
	}
}
