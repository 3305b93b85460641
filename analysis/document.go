package analysis

import (
	"context"
	_ "embed"
	"encoding/json"
	"io"
	"math"

	"spanwright/lang/model"
)

// Format is the name of the JSON document that [Results.WriteJSON] writes.
const Format = "spanwright-results/1"

// Schema is the JSON schema (draft 2020-12) of that document.
//
//go:embed results.schema.json
var Schema []byte

// DocumentOptions say what goes into the JSON document.
type DocumentOptions struct {
	// Stations is the number of evenly spaced points along each member, both ends
	// included. 0 stands for 11; 1 gives the first end alone, below 0 none.
	Stations int
	// Only are the numbers of the results to write; nil for all.
	Only []int
}

// The parts of the document; results.schema.json explains them. Lists and maps
// are never null, and numbers are always finite.
type (
	document struct {
		Format    string                      `json:"format"`
		Model     documentModel               `json:"model"`
		Nodes     map[string][3]number        `json:"nodes"`
		Results   []documentResult            `json:"results"`
		Envelopes map[string]documentEnvelope `json:"envelopes"`
		Limits    []documentLimit             `json:"limits"`
	}
	documentModel struct {
		Title    string `json:"title"`
		Plane    bool   `json:"plane"`
		Nodes    int    `json:"nodes"`
		Members  int    `json:"members"`
		Freedoms int    `json:"freedoms"`
	}
	documentResult struct {
		Name          string                    `json:"name"`
		Kind          string                    `json:"kind"`
		Family        string                    `json:"family,omitempty"`
		Equation      string                    `json:"equation,omitempty"`
		Factors       map[string]number         `json:"factors"`
		Displacements map[string][6]number      `json:"displacements"`
		Reactions     map[string][6]number      `json:"reactions"`
		Members       map[string]documentMember `json:"members"`
		Equilibrium   documentEquilibrium       `json:"equilibrium"`
	}
	documentEquilibrium struct {
		Applied  [6]number `json:"applied"`
		Reacted  [6]number `json:"reacted"`
		Residual number    `json:"residual"`
	}
	documentMember struct {
		Length   number                   `json:"length"`
		Ends     [2][6]number             `json:"ends"`
		Extremes map[string]documentRange `json:"extremes"`
		Stations []documentStation        `json:"stations"`
	}
	documentRange struct {
		Max documentPlace `json:"max"`
		Min documentPlace `json:"min"`
	}
	documentPlace struct {
		Value number `json:"value"`
		At    number `json:"at"`
	}
	documentStation struct {
		At number    `json:"at"`
		N  number    `json:"N"`
		Vy number    `json:"Vy"`
		Vz number    `json:"Vz"`
		T  number    `json:"T"`
		My number    `json:"My"`
		Mz number    `json:"Mz"`
		U  [6]number `json:"u"`
	}
	documentEnvelope struct {
		Combinations  []string                           `json:"combinations"`
		Displacements map[string]map[string]documentBand `json:"displacements"`
		Reactions     map[string]map[string]documentBand `json:"reactions"`
		Members       map[string]map[string]documentBand `json:"members"`
	}
	documentBand struct {
		Max documentGoverned `json:"max"`
		Min documentGoverned `json:"min"`
	}
	documentGoverned struct {
		Value   number  `json:"value"`
		At      *number `json:"at,omitempty"`
		Governs string  `json:"governs"`
	}
	documentLimit struct {
		File    string            `json:"file,omitempty"`
		Line    int               `json:"line"`
		Text    string            `json:"text"`
		Value   *number           `json:"value,omitempty"`
		Bound   *number           `json:"bound,omitempty"`
		Ratio   *number           `json:"ratio"`
		Governs string            `json:"governs,omitempty"`
		Member  string            `json:"member,omitempty"`
		At      *number           `json:"at,omitempty"`
		OK      bool              `json:"ok"`
		Problem string            `json:"problem,omitempty"`
		Next    []documentVerdict `json:"next,omitempty"`
	}
	documentVerdict struct {
		Value   number  `json:"value"`
		Bound   number  `json:"bound"`
		Ratio   *number `json:"ratio"`
		Governs string  `json:"governs"`
		Member  string  `json:"member,omitempty"`
		At      *number `json:"at,omitempty"`
	}
)

// number is a float64 that is written as 0 where it is −0. Everything else as
// encoding/json does: the shortest text that reads back the same.
type number float64

// MarshalJSON writes the number.
func (n number) MarshalJSON() ([]byte, error) {
	if n == 0 {
		return []byte("0"), nil
	}
	return json.Marshal(float64(n))
}

// WriteJSON writes the results as the JSON document of [Format]: the same text
// for the same model on every run. Envelopes and limits are worked out as far as
// they have not been. The error is the writer's, or the context's.
func (r *Results) WriteJSON(ctx context.Context, w io.Writer, o DocumentOptions) error {
	d, err := r.document(ctx, o)
	if err != nil {
		return err
	}
	encoder := json.NewEncoder(w)
	encoder.SetEscapeHTML(false)
	encoder.SetIndent("", " ")
	return encoder.Encode(d)
}

func (r *Results) document(ctx context.Context, o DocumentOptions) (*document, error) {
	m := r.model
	d := &document{
		Format: Format,
		Model:  documentModel{Title: m.Title, Plane: m.Plane, Nodes: len(m.Nodes), Members: len(m.Members), Freedoms: r.Freedoms()},
		Nodes:  map[string][3]number{}, Results: []documentResult{},
		Envelopes: map[string]documentEnvelope{}, Limits: []documentLimit{},
	}
	for _, n := range m.Nodes {
		d.Nodes[n.Name] = [3]number{number(n.Position[0]), number(n.Position[1]), number(n.Position[2])}
	}
	if o.Stations == 0 {
		o.Stations = 11
	}
	only := o.Only
	if only == nil {
		for i := range r.Len() {
			only = append(only, i)
		}
	}
	for _, i := range only {
		if err := ctx.Err(); err != nil {
			return nil, err
		}
		if result := r.At(i); result.Problem() == "" {
			d.Results = append(d.Results, r.documentResult(result, o.Stations))
		}
	}
	if err := Prepare(ctx, r.envelopes...); err != nil {
		return nil, err
	}
	for _, e := range r.envelopes {
		d.Envelopes[e.name] = e.document()
	}
	limits, err := r.Limits(ctx)
	if err != nil {
		return nil, err
	}
	for _, l := range limits {
		d.Limits = append(d.Limits, r.documentLimit(l))
	}
	return d, nil
}

func six(values [6]float64) (out [6]number) {
	for i, v := range values {
		out[i] = number(v)
	}
	return out
}

func (r *Results) documentResult(result Result, stations int) documentResult {
	m := r.model
	e := result.Equilibrium()
	d := documentResult{
		Name: result.Name(), Kind: "case",
		Factors: map[string]number{}, Displacements: map[string][6]number{},
		Reactions: map[string][6]number{}, Members: map[string]documentMember{},
		Equilibrium: documentEquilibrium{six(e.Applied), six(e.Reacted), number(e.Residual)},
	}
	if c := result.Combination(); c != nil {
		d.Kind, d.Equation = "combination", c.Equation
		if c.Family >= 0 {
			d.Family = m.Families[c.Family].Name
		}
	}
	for _, f := range result.Factors() {
		d.Factors[m.Cases[f.Case].Name] = number(f.Factor)
	}
	for i, n := range m.Nodes {
		d.Displacements[n.Name] = six(result.Movement(i))
	}
	for _, i := range SupportedNodes(m) {
		d.Reactions[m.Nodes[i].Name] = six(result.Reaction(i))
	}
	for i := range m.Members {
		d.Members[m.Members[i].Name] = documentMemberOf(result.Member(i), stations)
	}
	return d
}

func documentMemberOf(member Member, stations int) documentMember {
	ends := member.Ends()
	length := member.Length()
	d := documentMember{
		Length: number(length), Ends: [2][6]number{six(ends[0]), six(ends[1])},
		Extremes: map[string]documentRange{}, Stations: []documentStation{},
	}
	for _, q := range documented {
		if most, least, known := member.Range(q); known {
			d.Extremes[q.String()] = documentRange{
				documentPlace{number(most.Value), number(most.At)},
				documentPlace{number(least.Value), number(least.At)},
			}
		}
	}
	for k := range max(stations, 0) {
		at := 0.0
		if k > 0 {
			at = length * float64(k) / float64(stations-1)
		}
		force := func(q Quantity) number { return number(member.Force(q, at)) }
		d.Stations = append(d.Stations, documentStation{
			At: number(at), N: force(N), Vy: force(Vy), Vz: force(Vz), T: force(T), My: force(My), Mz: force(Mz),
			U: six(member.Movement(at)),
		})
	}
	return d
}

// documented are the quantities that the document has of members.
var documented = append(sectionForces[:], Deflection, NormalStress)

func (e *Envelope) document() documentEnvelope {
	d := documentEnvelope{
		Combinations:  []string{},
		Displacements: map[string]map[string]documentBand{},
		Reactions:     map[string]map[string]documentBand{},
		Members:       map[string]map[string]documentBand{},
	}
	if e.Empty() {
		return d
	}
	r, m := e.results, e.results.model
	for _, result := range e.Results() {
		d.Combinations = append(d.Combinations, result.Name())
	}
	nodal := func(bands [6]Band, names [6]string) map[string]documentBand {
		of := map[string]documentBand{}
		for i, band := range bands {
			of[names[i]] = documentBand{r.documentGoverned(band.Most, false), r.documentGoverned(band.Least, false)}
		}
		return of
	}
	for i, n := range m.Nodes {
		d.Displacements[n.Name] = nodal(e.Movement(i), MovementNames)
	}
	for _, i := range SupportedNodes(m) {
		d.Reactions[m.Nodes[i].Name] = nodal(e.Reaction(i), ForceNames)
	}
	for i := range m.Members {
		of := map[string]documentBand{}
		for _, q := range documented {
			if band, known := e.Along(i, q); known {
				of[q.String()] = documentBand{r.documentGoverned(band.Most, true), r.documentGoverned(band.Least, true)}
			}
		}
		d.Members[m.Members[i].Name] = of
	}
	return d
}

func (r *Results) documentGoverned(g Governed, placed bool) documentGoverned {
	d := documentGoverned{Value: number(g.Value), Governs: r.At(g.Result).Name()}
	if placed {
		at := number(g.At)
		d.At = &at
	}
	return d
}

func (r *Results) documentLimit(l Limit) documentLimit {
	written := &r.model.Limits[l.Index]
	d := documentLimit{Line: line(r.model, written.Origin), Text: written.Text, OK: l.Holds, Problem: l.Problem}
	if written.Origin.File > 0 {
		d.File = r.model.Files[written.Origin.File].Path
	}
	if l.Governs.Result < 0 {
		return d
	}
	v := r.documentVerdict(l.Governs)
	d.Value, d.Bound, d.Ratio = &v.Value, &v.Bound, v.Ratio
	d.Governs, d.Member, d.At = v.Governs, v.Member, v.At
	for _, next := range l.Next {
		d.Next = append(d.Next, r.documentVerdict(next))
	}
	return d
}

func (r *Results) documentVerdict(v Verdict) documentVerdict {
	d := documentVerdict{Value: number(v.Value), Bound: number(v.Bound), Ratio: finite(v.Ratio), Governs: r.At(v.Result).Name()}
	if v.Member >= 0 {
		d.Member, d.At = r.model.Members[v.Member].Name, finite(v.At)
	}
	return d
}

// finite returns the number, or nil where JSON has none for it.
func finite(v float64) *number {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return nil
	}
	n := number(v)
	return &n
}

// line returns the line of an origin, from 1.
func line(m *model.Model, o model.Origin) int {
	if o.File < 0 || o.File >= len(m.Files) {
		return 1
	}
	return m.Files[o.File].Position(o.Statement.Start).Line
}
