package nbe

// Account is the account of a data type.
type Account struct{ Text string }

// String is the account as text.
func (a *Account) String() string { return a.Text }

// Account is the account of the data type of a name.
func (e *Engine) Account(string) (*Account, bool) { return nil, false }
