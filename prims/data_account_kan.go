package prims

import (
	"example.com/boxwright/value"
	"example.com/boxwright/value/interval"
)

// The account of a declaration, continued: composition and transport. The rules
// for constructors are computed on lines of arguments and of parameters; those
// for composites, which hold for every system, are schemes.

func (x *accountant) composition() AccountSection {
	params, _ := x.params()
	t := NewDataType(x.d, params)
	name := x.own()
	if x.d.Formal {
		return AccountSection{"composition: formal", [][]string{
			{"(hcomp " + name + " a (φ (i) u) …) is canonical where no φ is top, and no constructor is pushed through it"},
			{"(elim (x C) (hcomp " + name + " a (φ (i) u) …) CASE …) = (comp (i C[x := (hfill " + name + " a i (φ (i) u) …)]) (elim (x C) a CASE …) (φ (i) (elim (x C) u CASE …)) …)"},
		}}
	}
	out := AccountSection{Title: "composition: strict"}
	out.Rules = append(out.Rules, []string{"where the base and every wall are made by one constructor it is pushed out, as below for one wall; otherwise the composite waits, and an elimination of it waits for it"})
	for _, k := range x.d.Constructors {
		x.under(func() {
			i := x.run.Fresh(0)
			lines, values := x.lines(k.Args, i, func(a *Argument, earlier []value.Value) value.Value { return a.At(x.run, params, earlier) })
			face := x.Dimension("k")
			ends := make([]value.Value, len(lines))
			for n, l := range lines {
				ends[n] = LaterApply(x.run, l, value.Zero())
			}
			con := func(args []value.Value) value.Value { return NewCon(x.run, k, params, args, nil) }
			inside := x.run.Fresh(interval.Single(face))
			walls := value.System{{Cube: interval.Eq0(face).Cube(0), I: inside, Body: con(x.run.SubstituteAll(values, interval.Rename(i, inside)))}}
			left := x.write(op(hcompSig, x.q.Type(t), x.q.Term(t, con(ends)), x.q.Walls(t, walls)), x.variables, x.dimensions)
			out.Rules = append(out.Rules, []string{left + " = " + x.text(t, Hcomp(x.run, t, con(ends), walls))})
		})
	}
	return out
}

func (x *accountant) transport() AccountSection {
	if len(x.d.Params) == 0 {
		return AccountSection{"transport", [][]string{{"(transp (i " + x.d.Name + ") φ a) = a"}}}
	}
	out := AccountSection{Title: "transport along a line of parameters (where φ holds it is the identity)"}
	i := x.run.Fresh(0)
	_, values := x.lines(x.d.Params, i, func(p *Argument, earlier []value.Value) value.Value { return p.At(x.run, earlier, nil) })
	t := NewDataType(x.d, values)
	t0, t1 := x.run.At(t, i, interval.Zero()), x.run.At(t, i, interval.One())
	params0 := x.run.SubstituteAll(values, interval.Assign(i, interval.Zero()))
	for _, k := range x.d.Constructors {
		x.under(func() {
			args, dims, _ := x.arguments(k, params0)
			v := NewCon(x.run, k, params0, args, dims)
			rule := []string{x.transpText(i, t, "bot", x.text(t0, v)) + " = " + x.text(t1, Transp(x.run, i, t, interval.Bot(), v))}
			switch {
			case len(k.Dims) == 0:
			case k.Commutes:
				rule = append(rule, k.Name+" commutes with transport: its boundary is built from arguments, dimensions and such constructors alone")
			default:
				rule = append(rule, k.Name+" is corrected by a composite: its boundary is built from more than arguments, dimensions and constructors that commute")
			}
			out.Rules = append(out.Rules, rule)
		})
	}
	if x.d.Formal {
		out.Rules = append(out.Rules, []string{x.transpText(i, t, "φ", "(hcomp "+x.typeText(t0)+" a (ψ (j) u) …)") + " = (hcomp " + x.typeText(t1) + " " +
			x.transpText(i, t, "φ", "a") + " (ψ (j) " + x.transpText(i, t, "φ", "u") + ") …)"})
	} else {
		out.Rules = append(out.Rules, []string{"where a composite waits, so does its transport"})
	}
	return out
}

// transpText is a transport along the line i.t as text.
func (x *accountant) transpText(i value.Name, t value.Value, face, v string) (text string) {
	x.under(func() {
		k := x.Dimension("i")
		text = "(transp (" + x.dimensions[len(x.dimensions)-1] + " " + x.typeText(x.run.At(t, i, interval.Var(k))) + ") " + face + " " + v + ")"
	})
	return text
}
func (c valueOfCase) Uses(int) bool                      { return true }
func (c valueOfCase) StrictIn(*value.Run, int) bool      { return false }
func (c valueOfCase) Enter(run *value.Run) []value.Value { return run.Frame(c.arity) }
func (c valueOfCase) Eval(run *value.Run, frame []value.Value) value.Value {
	return c.ApplyAll(run, frame)
}
