package nbe

import (
	"context"

	"example.com/boxwright/nbe/term"
	"example.com/boxwright/prims"
	"example.com/boxwright/quote"
	"example.com/boxwright/value"
)

// The account of a data type: what rules a declaration got, as text for people.

// Account is the account of a data type: its formation, constructors,
// elimination, composition and transport. It is the caller's own.
type Account = prims.Account

// Account tells the rules that the data type of the given name got from its
// declaration (CHM, "On Higher Inductive Types in Cubical Type Theory", LICS
// 2018, section 3). The rules are computed on variables and written in the
// notation, definitions folded. Cost: linear in the declaration and in the
// normal forms of its rules. Errors: NotFound where the name is no data type;
// those of limits and of the context. Safe for concurrent use.
func (e *Engine) Account(ctx context.Context, name string, options ...CallOption) (a *Account, err error) {
	d, ok := e.lookup(name).(*prims.Data)
	if !ok {
		return nil, &term.Error{Kind: term.NotFound, Message: "there is no data type of this name", GotText: name}
	}
	o := gather(options)
	err = e.call(ctx, o, func(run *value.Run) {
		size := int(o.limits.or(e.limits).Text)
		write := func(c term.Core, variables, dimensions []string) string {
			run.Work(1 + len(variables) + len(dimensions)) // each time the whole scope is gone over
			w, err := write(ctx, c, term.Names{Variables: variables, Dimensions: dimensions, Taken: e.notation.Taken, Size: size}, run.Account("nodes of text", int64(size)))
			if err != nil {
				run.Fail(err.(*term.Error))
			}
			return w.String()
		}
		a = d.Account(func() value.Quoter { return quote.NewReader(run, 0, 0, keepAll) }, write)
	})
	if err != nil {
		return nil, err
	}
	return a, nil
}
