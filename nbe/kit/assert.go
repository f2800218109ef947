package kit

import (
	"context"
	"errors"
	"fmt"
	"testing"

	"example.com/boxwright/nbe"
	"example.com/boxwright/nbe/notation"
	"example.com/boxwright/nbe/term"
)

// Assertions for go test, in the manner of testify: each returns whether it
// holds and marks the test as failed where it does not; its Require… form also
// ends the test. Messages name the shortest way to the difference.

// EqualAt asserts that a and b have type ty and are equal by definition, by
// the direct comparison and by the comparison of normal forms. ty may be nil:
// then a's type is inferred.
func EqualAt(t testing.TB, s *nbe.Scope, ty, a, b any, message ...any) bool {
	t.Helper()
	equal, account, err := compared(t, s, ty, a, b)
	if err != nil {
		return fail(t, message, "%v", err)
	}
	if !equal {
		return fail(t, message, "not equal by definition: %s", account)
	}
	return true
}

// DifferAt asserts that a and b have type ty and are not equal by definition.
func DifferAt(t testing.TB, s *nbe.Scope, ty, a, b any, message ...any) bool {
	t.Helper()
	equal, account, err := compared(t, s, ty, a, b)
	if err != nil {
		return fail(t, message, "%v", err)
	}
	if equal {
		return fail(t, message, "the two are equal by definition, both being %s", account)
	}
	return true
}

// compared compares in both ways; the account is the difference, or the common normal form.
func compared(t testing.TB, s *nbe.Scope, ty, a, b any) (equal bool, account string, err error) {
	t.Helper()
	ctx := context.Background()
	x, err := checked(t, s, a, ty)
	if err != nil {
		return false, "", fmt.Errorf("the first term: %w", err)
	}
	var y *nbe.Term
	if w, ok := b.(*nbe.Term); ok {
		y = w
	} else if y, err = s.CheckLike(ctx, written(t, s, b), x); err != nil {
		return false, "", fmt.Errorf("the second term: %w", err)
	}
	c, err := s.Compare(ctx, x, y)
	if err != nil {
		return false, "", err
	}
	if c.Verdict == nbe.Undecided {
		return false, "", fmt.Errorf("undecided: it depends on the hole %s", c.Hole)
	}
	l, err := s.Normal(ctx, x)
	if err != nil {
		return false, "", err
	}
	r, err := s.Normal(ctx, y)
	if err != nil {
		return false, "", err
	}
	same := len(l) == len(r)
	for k := 0; same && k < len(l); k++ {
		if same = term.Same(l[k].Term, r[k].Term); !same {
			account = formsDiffer(&l[k], &r[k])
		}
	}
	if same != (c.Verdict == nbe.Equal) {
		return false, "", fmt.Errorf("comparing says %s, comparing normal forms does not; %s; %s", c.Verdict, c.Difference, account)
	}
	if !same {
		return false, c.Difference.String(), nil
	}
	if len(l) > 0 {
		account = clip(l[0].String(), 400)
	}
	return true, account, nil
}

func formsDiffer(a, b *nbe.Form) string {
	l, err := a.Written()
	if err != nil {
		return err.Error()
	}
	r, err := b.Written()
	if err != nil {
		return err.Error()
	}
	return WayTo(l, r).String()
}

// NormalIs asserts that the normal form of a is the term want, elaborated at
// a's type but not evaluated, up to bound names. ty may be nil.
func NormalIs(t testing.TB, s *nbe.Scope, ty, a, want any, message ...any) bool {
	t.Helper()
	ctx := context.Background()
	x, err := checked(t, s, a, ty)
	if err != nil {
		return fail(t, message, "%v", err)
	}
	forms, err := s.Normal(ctx, x)
	if err != nil {
		return fail(t, message, "%v", err)
	}
	y, err := s.CheckLike(ctx, written(t, s, want), x)
	if err != nil {
		return fail(t, message, "the form that is wanted: %v", err)
	}
	for k, core := range y.Cores() {
		if term.Same(forms[k].Term, core) {
			continue
		}
		got, err := forms[k].Written()
		if err != nil {
			return fail(t, message, "%v", err)
		}
		w, err := s.Write(core)
		if err != nil {
			return fail(t, message, "%v", err)
		}
		return fail(t, message, "the normal form is another: %s", WayTo(got, w))
	}
	return true
}

// RefusedAs asserts that a is refused at ty (nil: by itself) with the kind.
func RefusedAs(t testing.TB, s *nbe.Scope, kind term.ErrorKind, ty, a any, message ...any) bool {
	t.Helper()
	_, err := checked(t, s, a, ty)
	return ErrorIs(t, err, kind, message...)
}

// ErrorIs asserts that an error of this module has the kind.
func ErrorIs(t testing.TB, err error, kind term.ErrorKind, message ...any) bool {
	t.Helper()
	if err == nil {
		return fail(t, message, "to be refused as %s, and was accepted", kind)
	}
	if !errors.Is(err, kind) {
		return fail(t, message, "to be refused as %s, and was as %s: %v", kind, term.KindOf(err), err)
	}
	return true
}

// StepsAtMost asserts that normalising a takes no more than limit steps.
func StepsAtMost(t testing.TB, s *nbe.Scope, limit int64, ty, a any, message ...any) bool {
	t.Helper()
	var stats nbe.Stats
	x, err := checked(t, s, a, ty)
	if err != nil {
		return fail(t, message, "%v", err)
	}
	if _, err = s.Normal(context.Background(), x, nbe.Count(&stats)); err != nil {
		return fail(t, message, "%v", err)
	}
	if stats.Steps > limit {
		return fail(t, message, "%d steps, and at most %d were allowed", stats.Steps, limit)
	}
	return true
}

// AllocationGrowth asserts how allocations grow with the size of a problem:
// work(n) does the work of size n, and between the two sizes its allocations
// may grow by no more than the factor. It counts objects, and takes no time.
func AllocationGrowth(t testing.TB, small, large int, factor float64, work func(n int), message ...any) bool {
	t.Helper()
	a := testing.AllocsPerRun(1, func() { work(small) })
	b := testing.AllocsPerRun(1, func() { work(large) })
	if b > factor*max(a, 1) {
		return fail(t, message, "%.0f allocations at size %d and %.0f at size %d: a factor of %.1f, and at most %.1f was allowed", a, small, b, large, b/max(a, 1), factor)
	}
	return true
}

func fail(t testing.TB, message []any, format string, args ...any) bool {
	t.Helper()
	text := fmt.Sprintf(format, args...)
	if len(message) > 0 {
		if f, ok := message[0].(string); ok && len(message) > 1 {
			text = fmt.Sprintf(f, message[1:]...) + ": " + text
		} else {
			text = fmt.Sprint(message...) + ": " + text
		}
	}
	t.Errorf("%s", text)
	return false
}

func require(t testing.TB, ok bool) {
	t.Helper()
	if !ok {
		t.FailNow()
	}
}

// RequireEqualAt is EqualAt, and ends the test.
func RequireEqualAt(t testing.TB, s *nbe.Scope, ty, a, b any, message ...any) {
	t.Helper()
	require(t, EqualAt(t, s, ty, a, b, message...))
}

// RequireDifferAt is DifferAt, and ends the test.
func RequireDifferAt(t testing.TB, s *nbe.Scope, ty, a, b any, message ...any) {
	t.Helper()
	require(t, DifferAt(t, s, ty, a, b, message...))
}

// RequireNormalIs is NormalIs, and ends the test.
func RequireNormalIs(t testing.TB, s *nbe.Scope, ty, a, want any, message ...any) {
	t.Helper()
	require(t, NormalIs(t, s, ty, a, want, message...))
}

// RequireRefusedAs is RefusedAs, and ends the test.
func RequireRefusedAs(t testing.TB, s *nbe.Scope, kind term.ErrorKind, ty, a any, message ...any) {
	t.Helper()
	require(t, RefusedAs(t, s, kind, ty, a, message...))
}

// RequireErrorIs is ErrorIs, and ends the test.
func RequireErrorIs(t testing.TB, err error, kind term.ErrorKind, message ...any) {
	t.Helper()
	require(t, ErrorIs(t, err, kind, message...))
}

// RequireStepsAtMost is StepsAtMost, and ends the test.
func RequireStepsAtMost(t testing.TB, s *nbe.Scope, limit int64, ty, a any, message ...any) {
	t.Helper()
	require(t, StepsAtMost(t, s, limit, ty, a, message...))
}

// RequireAllocationGrowth is AllocationGrowth, and ends the test.
func RequireAllocationGrowth(t testing.TB, small, large int, factor float64, work func(n int), message ...any) {
	t.Helper()
	require(t, AllocationGrowth(t, small, large, factor, work, message...))
}

// clip is text that is not longer than n bytes.
func clip(text string, n int) string {
	if len(text) <= n {
		return text
	}
	for n > 0 && text[n]&0xC0 == 0x80 {
		n--
	}
	return text[:n] + " …"
}

// formatted is a term in lines that fit a test's output.
func formatted(w *term.Written, indent string) string {
	return indented(notation.Format(w, 88), indent)
}
