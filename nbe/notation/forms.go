package notation

import "example.com/boxwright/nbe/term"

// The forms of terms: those whose text allows several names or parts at once,
// and all others by their slots. A function here returns nil, or false, when
// the form has the wrong number of parts; its caller notes the fault.

// listOf reports whether n is a list of at least one item.
func listOf(n *node) bool { return n.kind == listNode && len(n.items) > 0 }

// newForm is the form of word at n with k parts.
func (r *reader) newForm(n *node, word string, k int) *term.Written {
	return &term.Written{Kind: term.FormKind, Word: word, Parts: make([]term.Part, k), Place: r.place(n)}
}

// nestedNames reads (lam (x y …) t).
func (r *reader) nestedNames(n *node, items []node, word string) *term.Written {
	if len(items) != 2 {
		return nil
	}
	if !listOf(&items[0]) {
		r.fault(&items[0], "a list of names")
		return r.newForm(n, word, 1)
	}
	var out *term.Written
	dst := &out
	binders := r.binders(items[0].items)
	for k := range binders {
		w := r.newForm(n, word, 1)
		w.Parts[0].Binders = binders[k : k+1 : k+1]
		*dst, dst = w, &w.Parts[0].Body
	}
	r.put(&items[1], termHere, dst)
	return out
}

// nestedBindings reads (Pi ((x A) …) C): in front, for each name, one part for each of the positions.
func (r *reader) nestedBindings(n *node, items []node, word string, here ...position) *term.Written {
	if len(items) != 2 {
		return nil
	}
	shown, rows := "(x A)", "a list of (x A)"
	if len(here) == 2 {
		shown, rows = "(x T t)", "a list of (x T t)"
	}
	if !listOf(&items[0]) {
		r.fault(&items[0], rows)
		return r.newForm(n, word, 1)
	}
	var out *term.Written
	dst := &out
	for k := range items[0].items {
		row := &items[0].items[k]
		w := r.newForm(n, word, len(here)+1)
		*dst, dst = w, &w.Parts[len(here)].Body
		if row.kind != listNode || len(row.items) != len(here)+1 {
			r.fault(row, shown)
			continue
		}
		w.Parts[len(here)].Binders = []term.Binder{r.binder(&row.items[0])}
		for j, p := range here {
			r.put(&row.items[j+1], p, &w.Parts[j].Body)
		}
	}
	r.put(&items[1], termHere, dst)
	return out
}

// nestedRight reads (-> A B … C), all but the last standing at the given position.
func (r *reader) nestedRight(n *node, items []node, word string, here position) *term.Written {
	if len(items) < 2 {
		return nil
	}
	var out *term.Written
	dst := &out
	last := len(items) - 1
	for k := range last {
		w := r.newForm(n, word, 2)
		r.put(&items[k], here, &w.Parts[0].Body)
		*dst, dst = w, &w.Parts[1].Body
	}
	r.put(&items[last], termHere, dst)
	return out
}

// nestedAt reads (at p r s …), nested to the left.
func (r *reader) nestedAt(n *node, items []node) *term.Written {
	if len(items) < 2 {
		return nil
	}
	var out *term.Written
	dst := &out
	for k := len(items) - 1; k > 0; k-- {
		w := r.newForm(n, "at", 2)
		r.put(&items[k], dimensionHere, &w.Parts[1].Body)
		*dst, dst = w, &w.Parts[0].Body
	}
	r.put(&items[0], termHere, dst)
	return out
}

// elim reads (elim (x C) t CASE …).
func (r *reader) elim(n *node, items []node) *term.Written {
	if len(items) < 2 {
		return nil
	}
	w := r.newForm(n, "elim", 3)
	r.under(&items[0], []term.Sort{term.TermSort}, &w.Parts[0])
	r.put(&items[1], termHere, &w.Parts[1].Body)
	rows := make([][]term.Part, len(items)-2)
	w.Parts[2].Rows = rows
	for k := range rows {
		row := &items[k+2]
		if row.kind != listNode || len(row.items) != 2 {
			r.fault(row, "(c t) or ((c x …) t)")
			continue
		}
		rows[k] = make([]term.Part, 2)
		head := &row.items[0]
		if listOf(head) {
			rows[k][1].Binders = r.binders(head.items[1:])
			head = &head.items[0]
		}
		if head.kind == listNode {
			r.fault(head, "a constructor's name")
		} else {
			r.put(head, nameHere, &rows[k][0].Body)
		}
		r.put(&row.items[1], termHere, &rows[k][1].Body)
	}
	return w
}

// under reads a body under names, "(i … t)".
func (r *reader) under(n *node, binds []term.Sort, part *term.Part) {
	k := len(binds)
	if n.kind != listNode || len(n.items) != k+1 {
		r.fault(n, namesText(binds, " A)"))
		return
	}
	part.Binders = r.binders(n.items[:k])
	r.put(&n.items[k], termHere, &part.Body)
}

// slots reads the items of a form, or of a row, by its slots. It recurs on the
// shape of the form only.
func (r *reader) slots(parts *[]term.Part, items []node, slots []term.Slot, row bool) bool {
	*parts = make([]term.Part, 0, max(len(slots), len(items)))
	for _, s := range slots {
		switch {
		case s.Rows != nil:
			rows := make([][]term.Part, len(items))
			for k := range items {
				if items[k].kind != listNode || !r.slots(&rows[k], items[k].items, s.Rows, true) {
					r.fault(&items[k], rowText(s.Rows))
				}
			}
			*parts = append(*parts, term.Part{Rows: rows})
			return true
		case s.Rest && len(items) == 0:
			return false
		}
		for again := true; again; again = s.Rest && len(items) > 0 {
			*parts = append(*parts, term.Part{})
			part := &(*parts)[len(*parts)-1]
			switch {
			case len(items) == 0:
				return false
			case len(s.Binds) > 0 && row:
				if len(items) < 2 {
					return false
				}
				if items[0].kind == listNode && len(items[0].items) == len(s.Binds) {
					part.Binders = r.binders(items[0].items)
				} else {
					r.fault(&items[0], namesText(s.Binds, ")"))
				}
				r.put(&items[1], termHere, &part.Body)
				items = items[2:]
				continue
			case len(s.Binds) > 0:
				r.under(&items[0], s.Binds, part)
			default:
				r.put(&items[0], positionOf(s), &part.Body)
			}
			items = items[1:]
		}
	}
	return len(items) == 0
}
