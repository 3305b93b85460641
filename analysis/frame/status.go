package frame

// status says which one-way parts do not act. The zero value: all act.
type status struct {
	slack  []bool // by member; nil: none
	lifted []bool // by hold; nil: none
}

func (st *status) slackens(member int) bool { return st.slack != nil && st.slack[member] }
func (st *status) lifts(hold int) bool      { return st.lifted != nil && st.lifted[hold] }

// key is the status as a text, to find variants by.
func (st *status) key() string {
	bytes := make([]byte, 0, len(st.slack)+len(st.lifted))
	for _, list := range [][]bool{st.slack, st.lifted} {
		for _, off := range list {
			if off {
				bytes = append(bytes, 1)
			} else {
				bytes = append(bytes, 0)
			}
		}
	}
	return string(bytes)
}
