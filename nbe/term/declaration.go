package term

// Declaration is a data declaration as readers and hosts write it: a name, a
// telescope of parameters, and constructors. Inside it the data type is
// written with its parameters.
type Declaration struct {
	Name         string
	Params       []Param
	Composition  string // "strict", "formal", or empty: strict without path constructors, formal with them
	Compositions int    // how many composition clauses stood in the text; more than one is refused
	Constructors []Constructor
	Place        Place
}

// Param is one entry of a telescope: a name with its type; a type may mention
// the names before it.
type Param struct {
	Name  string
	Type  *Written
	Place Place
}

// Constructor is one constructor of a declaration: a point constructor (Path
// false) with arguments, or a path constructor with arguments, dimensions and
// a boundary.
type Constructor struct {
	Name     string
	Path     bool
	Args     []Param
	Dims     []Binder
	Boundary []BoundaryWall
	Place    Place
}

// BoundaryWall says which element a path constructor equals on a face of its dimensions.
type BoundaryWall struct {
	Face    *Written
	Element *Written
}
