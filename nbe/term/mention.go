package term

// Walk visits every node of c once, as a shared graph, with every argument
// that is no node; it stops where visit returns false. It does not nest the stack.
func Walk(c Core, visit func(Arg) bool) {
	seen := map[*Op]bool{}
	stack := []Arg{c}
	for len(stack) > 0 {
		a := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		switch a := a.(type) {
		case *Op:
			if seen[a] {
				continue
			}
			seen[a] = true
			if !visit(a) {
				return
			}
			stack = append(stack, a.Args...)
		case *Bound:
			if !visit(a) {
				return
			}
			stack = append(stack, a.Body)
		case Rows:
			for _, row := range a {
				stack = append(stack, row...)
			}
		case nil:
		default:
			if !visit(a) {
				return
			}
		}
	}
}

// FreeVariables are the levels below n that c mentions, in order. each, if not
// nil, is called for every node that is visited.
func FreeVariables(c Core, n int, each func()) []int {
	has := make([]bool, n)
	Walk(c, func(a Arg) bool {
		if each != nil {
			each()
		}
		if v, ok := a.(*Variable); ok && v.Level < n {
			has[v.Level] = true
		}
		return true
	})
	out := []int{}
	for level, ok := range has {
		if ok {
			out = append(out, level)
		}
	}
	return out
}

// References reports whether c mentions a declaration for which is holds. each,
// if not nil, is called for every node that is visited.
func References(c Core, is func(Reference) bool, each func()) (found bool) {
	Walk(c, func(a Arg) bool {
		if each != nil {
			each()
		}
		if r, ok := a.(Reference); ok && is(r) {
			found = true
		}
		return !found
	})
	return found
}
