package term

// The head words of the notation and the shapes of their forms, as the
// written tree holds them. Where the text allows several names or arguments at
// once (lam, line, Pi, Sigma, ->, *, pair, at, let), the tree nests: one name
// or one argument for each node, to the right, and to the left for at.
var (
	one   = []Sort{TermSort}
	dim   = []Sort{DimensionSort}
	plain = Slot{}
	wall  = Slot{Rows: []Slot{{Sort: FaceSort}, {Binds: dim}}}
)

// Words returns the shapes of the built-in head words that stand for terms,
// dimensions and faces. The slice is the caller's own.
func Words() []Shape {
	return []Shape{
		{"lam", []Slot{{Binds: one}}},
		{"Pi", []Slot{plain, {Binds: one}}},
		{"->", []Slot{plain, plain}},
		{"Sigma", []Slot{plain, {Binds: one}}},
		{"*", []Slot{plain, plain}},
		{"pair", []Slot{plain, plain}},
		{"fst", []Slot{plain}},
		{"snd", []Slot{plain}},
		{"Path", []Slot{plain, plain, plain}},
		{"PathOver", []Slot{{Binds: dim}, plain, plain}},
		{"line", []Slot{{Binds: dim}}},
		{"at", []Slot{plain, {Sort: DimensionSort}}},
		{"Unit", nil},
		{"unit", nil},
		{"U", []Slot{{Sort: LevelSort}}},
		{"elim", []Slot{{Binds: one}, plain, {Rows: []Slot{{Sort: NameSort}, {Many: true}}}}},
		{"transp", []Slot{{Binds: dim}, {Sort: FaceSort}, plain}},
		{"hcomp", []Slot{plain, plain, wall}},
		{"comp", []Slot{{Binds: dim}, plain, wall}},
		{"hfill", []Slot{plain, plain, {Sort: DimensionSort}, wall}},
		{"fill", []Slot{{Binds: dim}, plain, {Sort: DimensionSort}, wall}},
		{"tfill", []Slot{{Binds: dim}, {Sort: FaceSort}, plain, {Sort: DimensionSort}}},
		{"Glue", []Slot{plain, {Rows: []Slot{{Sort: FaceSort}, plain, plain}}}},
		{"glue", []Slot{plain, {Rows: []Slot{{Sort: FaceSort}, plain}}}},
		{"unglue", []Slot{plain}},
		{"Equiv", []Slot{plain, plain}},
		{"ann", []Slot{plain, plain}},
		{"let", []Slot{plain, plain, {Binds: one}}},
		{"I", nil},
		{"min", []Slot{{Sort: DimensionSort, Rest: true}}},
		{"max", []Slot{{Sort: DimensionSort, Rest: true}}},
		{"rev", []Slot{{Sort: DimensionSort}}},
		{"top", nil},
		{"bot", nil},
		{"=", []Slot{{Sort: DimensionSort}, {Sort: DimensionSort}}},
		{"and", []Slot{{Sort: FaceSort, Rest: true}}},
		{"or", []Slot{{Sort: FaceSort, Rest: true}}},
	}
}

// ScriptWords are the head words of scripts and of data declarations: they
// cannot be names, and no former may bring them.
func ScriptWords() []string {
	return []string{"def", "assume", "data", "same", "differ", "normal", "show", "blocked", "reject", "load", "point", "path", "composition"}
}
