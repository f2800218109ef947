package term

// How the operators are written whose written form is not their word followed
// by their arguments: application, constructors, eliminations, and the types
// that have a shorter form when they do not depend.

// special says how an operator is written and how many arguments it has at least.
type special struct {
	args  int
	write func(w *writer, c *Op) *Written
}

// specialWriters goes by the names of signatures; it is never written after initialisation.
var specialWriters = map[string]special{
	"app":      {2, (*writer).app},
	"Pi":       {2, (*writer).pi},
	"PiDim":    {1, (*writer).piDim},
	"Sigma":    {2, (*writer).sigma},
	"lam":      {1, func(w *writer, c *Op) *Written { return w.nested("lam", c, one) }},
	"lamDim":   {1, func(w *writer, c *Op) *Written { return w.nested("lam", c, dim) }},
	"line":     {1, func(w *writer, c *Op) *Written { return w.nested("line", c, dim) }},
	"PathOver": {3, (*writer).pathOver},
	"at":       {2, (*writer).at},
	"let":      {3, (*writer).let},
	"data":     {1, (*writer).data},
	"con":      {2, (*writer).con},
	"elim":     {5, (*writer).elim},
	"numeral":  {1, (*writer).numeral},
}

func (w *writer) nested(word string, c *Op, sorts []Sort) *Written {
	f := Form(word, Part{})
	w.bound(c.Args[0], &f.Parts[0], sorts, nil, "")
	return f
}

// app writes a whole spine of applications as one.
func (w *writer) app(c *Op) *Written {
	n := 1
	head := Core(c)
	for {
		o, ok := head.(*Op)
		if !ok || o.Sig != c.Sig || len(o.Args) < 2 {
			break
		}
		if head, ok = o.Args[0].(Core); !ok {
			w.fail(Internal, "what is applied is %T", o.Args[0])
			return nil
		}
		if w.watch.Ended(1) {
			return nil
		}
		if n++; w.made+n > w.limit {
			w.made = w.limit + 1 // each argument counts too
			return nil
		}
	}
	w.made += n - 2 // this node and the head are counted elsewhere
	f := &Written{Kind: ApplyKind, Parts: make([]Part, n)}
	if o, ok := head.(*Op); ok && (o.Sig.Name == "data" && len(o.Args) == 1 || o.Sig.Name == "con" && len(o.Args) == 2) {
		// A bare name here would take the arguments for its own.
		f.Parts[0].Body = &Written{Kind: ApplyKind, Parts: make([]Part, 1)}
		w.core(head, &f.Parts[0].Body.Parts[0].Body)
	} else {
		w.core(head, &f.Parts[0].Body)
	}
	spine := make([]Arg, n-1)
	for k, o := n-2, c; k >= 0; k-- {
		spine[k] = o.Args[1]
		o, _ = o.Args[0].(*Op)
	}
	for k, a := range spine {
		w.arg(a, plain, &f.Parts[k+1])
	}
	return f
}

func (w *writer) pi(c *Op) *Written { return w.dependent("Pi", "->", c) }

func (w *writer) sigma(c *Op) *Written { return w.dependent("Sigma", "*", c) }

func (w *writer) dependent(word, unused string, c *Op) *Written {
	f := Form(word, Part{}, Part{})
	w.core(c.Args[0], &f.Parts[0].Body)
	w.bound(c.Args[1], &f.Parts[1], one, f, unused)
	return f
}

func (w *writer) piDim(c *Op) *Written {
	f := Form("Pi", Plain(Interval()), Part{})
	w.bound(c.Args[0], &f.Parts[1], dim, f, "->")
	return f
}

func (w *writer) pathOver(c *Op) *Written {
	f := Form("PathOver", Part{}, Part{}, Part{})
	w.bound(c.Args[0], &f.Parts[0], dim, f, "Path")
	w.core(c.Args[1], &f.Parts[1].Body)
	w.core(c.Args[2], &f.Parts[2].Body)
	return f
}

func (w *writer) at(c *Op) *Written {
	f := Form("at", Part{}, Part{})
	w.core(c.Args[0], &f.Parts[0].Body)
	w.arg(c.Args[1], Slot{Sort: DimensionSort}, &f.Parts[1])
	return f
}

func (w *writer) let(c *Op) *Written {
	f := Form("let", Part{}, Part{}, Part{})
	w.core(c.Args[0], &f.Parts[0].Body)
	w.core(c.Args[1], &f.Parts[1].Body)
	w.bound(c.Args[2], &f.Parts[2], one, nil, "")
	return f
}

func (w *writer) data(c *Op) *Written { return w.named(c.Args[0], c.Args[1:]) }

func (w *writer) con(c *Op) *Written { return w.named(c.Args[0], c.Args[2:]) }

// named writes what a reference names, at its arguments.
func (w *writer) named(reference Arg, args []Arg) *Written {
	r, ok := reference.(Reference)
	if !ok {
		w.fail(Internal, "%T where a declaration's name stands", reference)
		return nil
	}
	head := w.mention(r.Name)
	if len(args) == 0 {
		return head
	}
	f := &Written{Kind: ApplyKind, Parts: make([]Part, len(args)+1)}
	f.Parts[0].Body = head
	for k, a := range args {
		w.arg(a, plain, &f.Parts[k+1])
	}
	return f
}

func (w *writer) numeral(c *Op) *Written {
	n, ok := c.Args[0].(Number)
	if !ok || n.Int == nil {
		w.fail(Internal, "a numeral without a number")
		return nil
	}
	return w.number(n.Int)
}

// elim writes an elimination: its arguments are the declaration and its
// parameters, which are silent, the family, what is eliminated, and the cases.
func (w *writer) elim(c *Op) *Written {
	f := Form("elim", Part{}, Part{}, Part{})
	w.bound(c.Args[2], &f.Parts[0], one, nil, "")
	w.core(c.Args[3], &f.Parts[1].Body)
	cases, ok := c.Args[4].(Rows)
	if !ok {
		w.fail(Internal, "%T where the cases of an elimination stand", c.Args[4])
		return nil
	}
	rows := make([][]Part, len(cases))
	f.Parts[2].Rows = rows
	for k, row := range cases {
		if len(row) != 2 {
			w.fail(Internal, "a case of %d parts", len(row))
			return nil
		}
		r, ok := row[0].(Reference)
		body, isBound := row[1].(*Bound)
		if !ok || !isBound || body == nil {
			w.fail(Internal, "a case of %T and %T", row[0], row[1])
			return nil
		}
		sorts := make([]Sort, len(body.Hints))
		if t, ok := r.Target.(interface{ Dimensions(constructor int) int }); ok {
			for j := max(0, len(sorts)-t.Dimensions(r.Index)); j < len(sorts); j++ {
				sorts[j] = DimensionSort
			}
		}
		rows[k] = make([]Part, 2)
		rows[k][0].Body = w.mention(r.Name)
		w.bound(body, &rows[k][1], sorts, nil, "")
	}
	return f
}
