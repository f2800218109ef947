package nbe

import (
	"context"

	"example.com/boxwright/nbe/term"
)

// Blockage is the account of what keeps a term from computing further.
type Blockage struct{ Text string }

// String is the account as text.
func (b *Blockage) String() string { return b.Text }

// Blocked tells what blocks t.
func (s *Scope) Blocked(context.Context, *Term, ...CallOption) (*Blockage, error) {
	return nil, &term.Error{Kind: term.Unsupported, Message: "the account of what blocks a term is not supported"}
}

// Account is the account of a data type.
type Account struct{ Text string }

// String is the account as text.
func (a *Account) String() string { return a.Text }

// Account is the account of the data type of a name.
func (e *Engine) Account(string) (*Account, bool) { return nil, false }
