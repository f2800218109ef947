package kit

import (
	"errors"
	"fmt"
	"strings"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/term"
)

// Failures of laws, as a person wants them in go test.

// Failure is a law that is broken, on the smallest input that was found.
type Failure struct {
	Former   string
	Options  []nbe.Option // of an engine that has the former
	Law      string
	Instance *Instance
	What     string        // the term that is wrong
	Where    string        // the substitution, or where else it goes wrong
	Kind     string        // of the substitution
	Face     *term.Written // the face at fault, if there is one
	Made     string        // how the left side came about
	// Left and Right are the two sides as normal forms; nil where there is an error instead.
	Left, Right *term.Written
	// Type is the type of both sides, over the dimensions Over.
	Type  *term.Written
	Over  []string
	right *term.Written // what Right is the normal form of, where it is at hand
	Err   error
	Seed  uint64 // of the trial
	Drawn int    // how many choices the trial drew, and how many were left of them
	Kept  int
	build build
}

// Internal reports whether the failure is a fault inside the former or the engine.
func (f *Failure) Internal() bool { return f.Err != nil && errors.Is(f.Err, term.Internal) }

// statement is what the law says.
func (f *Failure) statement() string {
	for _, l := range Laws() {
		if l.Name == f.Law {
			return l.Statement
		}
	}
	return ""
}

// Difference is the shortest way to where the two sides differ.
func (f *Failure) Difference() Way {
	if f.Left == nil || f.Right == nil {
		return Way{}
	}
	return WayTo(f.Left, f.Right)
}

// Report is the failure as text: the law, what broke it, both sides as normal
// forms with their difference, the drawing, how to do it again, and a script.
func (f *Failure) Report() string {
	var b strings.Builder
	line := func(format string, args ...any) { fmt.Fprintf(&b, format+"\n", args...) }
	line("%s breaks the law of %s: %s", f.Former, f.Law, f.statement())
	what := f.What
	if f.Where != "" && f.Where != what {
		if what != "" {
			what += ", "
		}
		what += f.Where
	}
	if f.Kind != "" {
		what += " (" + f.Kind + ")"
	}
	if what != "" {
		line("  at      %s", what)
	}
	if f.Face != nil {
		line("  face    %s", f.Face)
	}
	if f.Made != "" {
		line("  left is %s", f.Made)
	}
	if f.Left != nil {
		line("  left\n%s", formatted(f.Left, "    "))
	}
	if f.Right != nil {
		line("  right\n%s", formatted(f.Right, "    "))
	}
	if f.Left != nil && f.Right != nil {
		line("  differ  %s", f.Difference())
	}
	if f.Err != nil {
		line("  error   %v", clip(f.Err.Error(), 1000))
	}
	if x := f.Instance; x != nil {
		line("on")
		for _, v := range x.used() {
			line("  %s : %s", v.Name, v.Type)
		}
		line("  dimensions %s", strings.Join(x.Dimensions, " "))
		b.WriteString(f.Drawing())
	}
	if f.Former != "" {
		line("again with kit.Seed(%d), kit.Trials(1); %d choices drawn, %d left after shrinking; %s", f.Seed, f.Drawn, f.Kept, f.build.name)
	}
	if s := f.Script(); s != "" {
		line("as a script\n%s", strings.TrimRight(indented(s, "  "), "\n "))
	}
	return b.String()
}

// used are the variables that the instance mentions, and what they mention.
func (x *Instance) used() []Variable {
	names := namesIn(x.Term())
	for _, e := range x.Eliminations {
		for n := range namesIn(e.Of(zero)) {
			names[n] = true
		}
	}
	var out []Variable
	for k := len(x.Variables) - 1; k >= 0; k-- {
		v := x.Variables[k]
		if names[v.Name] {
			out = append([]Variable{v}, out...)
			for n := range namesIn(v.Type) {
				names[n] = true
			}
		}
	}
	return out
}

// Script is the failing input as a script that can be pasted: the variables as
// assumptions, the operation as a definition that is shown, and, where there
// are two sides, the equation between them, which fails.
func (f *Failure) Script() string {
	x := f.Instance
	if x == nil {
		return ""
	}
	p := Paste{Variables: x.used(), Dimensions: x.Dimensions}
	p.Define("subject", x.TypeAt(oneEnd), x.Term())
	if f.Type != nil && f.Law != LawVariables {
		p.Dimensions = f.Over
		right := f.right
		if right == nil {
			right = f.Right
		}
		where := ""
		if f.Where != "" {
			where = ", " + f.Where
		}
		p.Comment(f.What + where + ": left is " + f.Made)
		p.Same(f.Type, f.Left, right)
	}
	return p.String()
}

// Paste makes a script of terms over variables and dimensions.
type Paste struct {
	Variables  []Variable
	Dimensions []string
	forms      []string
}

// over is a term or a type as a function of the dimensions.
func (p *Paste) over(ty bool, w *term.Written) *term.Written {
	if !ty {
		return term.Lam(w, p.Dimensions...)
	}
	for k := len(p.Dimensions) - 1; k >= 0; k-- {
		w = term.Pi(p.Dimensions[k], term.Interval(), w)
	}
	return w
}

// Define adds a definition of a term over the dimensions, and shows it.
func (p *Paste) Define(name string, ty, w *term.Written) {
	p.forms = append(p.forms, fmt.Sprintf("(def %s\n  %s\n  %s)", name, p.over(true, ty), p.over(false, w)), fmt.Sprintf("(show %s)", name))
}

// Same adds that two terms over the dimensions are equal.
func (p *Paste) Same(ty, a, b *term.Written) {
	p.forms = append(p.forms, fmt.Sprintf("(same %s\n  %s\n  %s)", p.over(true, ty), p.over(false, a), p.over(false, b)))
}

// Comment adds a comment.
func (p *Paste) Comment(text string) {
	p.forms = append(p.forms, "; "+strings.ReplaceAll(text, "\n", "\n; "))
}

// String is the script.
func (p *Paste) String() string {
	var b strings.Builder
	for _, v := range p.Variables {
		fmt.Fprintf(&b, "(assume %s %s)\n", v.Name, v.Type)
	}
	for _, f := range p.forms {
		b.WriteString(f + "\n")
	}
	return b.String()
}
