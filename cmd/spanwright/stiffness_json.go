package main

import (
	"encoding/json"
	"io"
	"math"

	"spanwright/analysis/frame"
	"spanwright/lang/model"
)

// documentOfStiffness is the form spanwright-stiffness/1, in SI units: of a node
// or of a member. What has no end, because a support holds it, is null.
type documentOfStiffness struct {
	Format string          `json:"format"`
	Node   *nodeDocument   `json:"node,omitempty"`
	Member *memberDocument `json:"member,omitempty"`
}

type nodeDocument struct {
	Name string `json:"name"`
	// Axes are those of the freedoms, as rows in global coordinates.
	Axes [3][3]float64 `json:"axes"`
	// Freedoms name the rows and columns of the blocks.
	Freedoms    []string             `json:"freedoms"`
	Stiffness   [][]*float64         `json:"stiffness"`
	Flexibility [][]*float64         `json:"flexibility"`
	Direct      []directionsDocument `json:"direct"`
}

// directionsDocument is the force for one unit of one movement; null where a
// support holds it.
type directionsDocument struct {
	Freedom    string   `json:"freedom"`
	OthersHeld *float64 `json:"othersHeld"`
	OthersFree *float64 `json:"othersFree"`
}

type memberDocument struct {
	Name  string         `json:"name"`
	Own   [12][12]number `json:"own"`
	World [12][12]number `json:"global"`
	Terms []termDocument `json:"terms"`
	// Names give the closed form of each entry of own; "" where it is zero or has
	// none.
	Names [12][12]string `json:"names"`
}

type termDocument struct {
	Name   string  `json:"name"`
	Value  float64 `json:"value"`
	Row    int     `json:"row"`
	Column int     `json:"column"`
}

// number is a float64 that is written as 0 where it is −0.
type number float64

// MarshalJSON writes the number.
func (n number) MarshalJSON() ([]byte, error) { return json.Marshal(float64(n) + 0) }

func documentOfNode(m *model.Model, k *frame.NodeStiffness) documentOfStiffness {
	d := &nodeDocument{Name: m.Nodes[k.Node].Name, Axes: k.Axes, Freedoms: []string{}, Stiffness: finite(k.Stiffness), Flexibility: finite(k.Flexibility)}
	for _, f := range k.Freedoms {
		d.Freedoms = append(d.Freedoms, movementNames[f])
	}
	for _, f := range freedoms(m) {
		d.Direct = append(d.Direct, directionsDocument{movementNames[f], finiteOrNull(k.OthersHeld[f]), finiteOrNull(k.OthersFree[f])})
	}
	return documentOfStiffness{Format: "spanwright-stiffness/1", Node: d}
}

func documentOfMember(m *model.Model, k *frame.MemberStiffness) documentOfStiffness {
	d := &memberDocument{Name: m.Members[k.Member].Name, Terms: []termDocument{}}
	for i := range 12 {
		for j := range 12 {
			d.Own[i][j], d.World[i][j], d.Names[i][j] = number(k.Own[12*i+j]), number(k.Global[12*i+j]), k.Names[12*i+j]
		}
	}
	for _, t := range k.Terms {
		d.Terms = append(d.Terms, termDocument(t))
	}
	return documentOfStiffness{Format: "spanwright-stiffness/1", Member: d}
}

func finite(values [][]float64) [][]*float64 {
	rows := make([][]*float64, len(values))
	for i, row := range values {
		rows[i] = make([]*float64, len(row))
		for j, v := range row {
			rows[i][j] = finiteOrNull(v)
		}
	}
	return rows
}

func finiteOrNull(v float64) *float64 {
	if math.IsInf(v, 0) || math.IsNaN(v) {
		return nil
	}
	v += 0 // no −0
	return &v
}

func writeDocument(w io.Writer, document any) error {
	encoder := json.NewEncoder(w)
	encoder.SetEscapeHTML(false)
	encoder.SetIndent("", "  ")
	return encoder.Encode(document)
}
