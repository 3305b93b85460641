// Package analysis answers a model: [Run] solves it and returns [Results], from
// which everything that is shown to people is asked.
//
//	r, err := analysis.Run(ctx, m, previous)
//	ULS := r.Envelope(0)                       // of the model's first family
//	band, known := ULS.Along(member, analysis.My)
//	fmt.Println(band.Most.Value, band.Most.At, r.At(band.Most.Result).Name())
//
// # How it works
//
// Every load case is solved once. A combination is a sum of cases and is never
// solved nor stored: what is asked of it is superposed on the spot. Only where
// one-way members or supports are, each combination is solved on its own
// (subject.go). Courses along members are recovered from the movements when they
// are asked for. Envelopes find their extremes exactly and in one pass over the
// combinations (analysis/envelope), and are kept, as limits are. So memory grows
// with cases times freedoms and with families times members, not with
// combinations times members.
//
// A model that can move without resistance, or that cannot be solved for another
// reason, gives Results without numbers, whose diagnostics say what is wrong
// ([Results.Solved], [Results.Diagnostics]). Run returns an error only when its
// context ends.
//
// Results do not change and may be read by any number of goroutines. Handing the
// last Results to the next Run lets it use the factors again that an edit leaves
// ([Results.Way] says which).
//
// # A new code of practice
//
// Combination rules are data in analysis/combine; its package documentation has
// the recipe.
//
// What does not live here: the equations (analysis/frame, analysis/element,
// analysis/sparse), drawings (analysis/diagram), tables and other writing for
// people (cmd, lsp).
package analysis
