package main

import (
	"bytes"
	"errors"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// The program as a process: what it prints where, and its exit status. The
// test binary is the program when the environment asks for it, so that nothing
// needs to be built.

const asProgram = "BOXWRIGHT_TEST_AS_SCRIPT"

func TestMain(m *testing.M) {
	if os.Getenv(asProgram) != "" {
		main()
		return
	}
	os.Exit(m.Run())
}

type outcome struct {
	status         int
	stdout, stderr string
}

// command is the program with arguments, in a directory that holds the files,
// given by name.
func command(t *testing.T, files map[string]string, args ...string) *exec.Cmd {
	dir := t.TempDir()
	for name, text := range files {
		require.NoError(t, os.MkdirAll(filepath.Dir(filepath.Join(dir, name)), 0o755))
		require.NoError(t, os.WriteFile(filepath.Join(dir, name), []byte(text), 0o644))
	}
	self, err := os.Executable()
	require.NoError(t, err)
	c := exec.Command(self, args...)
	c.Dir = dir
	c.Env = append(os.Environ(), asProgram+"=1")
	return c
}

func finish(t *testing.T, c *exec.Cmd) outcome {
	var stdout, stderr bytes.Buffer
	c.Stdout, c.Stderr = &stdout, &stderr
	err := c.Run()
	var exit *exec.ExitError
	if err != nil && !errors.As(err, &exit) {
		require.NoError(t, err)
	}
	return outcome{c.ProcessState.ExitCode(), stdout.String(), stderr.String()}
}

func TestOutcomes(t *testing.T) {
	files := map[string]string{
		"good.sexp":     "(def two Nat (suc 1))\n(same Nat two 2)\n(normal two 2)\n(reject (show berth))\n",
		"bad.sexp":      "(def crates Nat unit)\n(same Nat 1 2)\n  (show\n    (drum 1))\n(show 3)\n",
		"open.sexp":     "(show 1)\n(show (suc 2)\n",
		"head.sexp":     "(show 1)\n(elim)\n",
		"load.sexp":     "(load \"sub/part.sexp\")\n(load \"sub/../sub/part.sexp\")\n(show crane)\n",
		"sub/part.sexp": "(def crane Nat 7)\n(load \"more.sexp\")\n",
		"sub/more.sexp": "(show 8)\n",
		"gone.sexp":     "(show 1)\n(load \"nowhere.sexp\")\n(show 2)\n",
		"try.sexp":      "(reject (load \"bad.sexp\"))\n(reject (load \"good.sexp\"))\n",
		"tryopen.sexp":  "(reject (load \"open.sexp\"))\n",
		"turn.sexp":     "(load \"turn.sexp\")\n(show 4)\n",
		"budget.sexp":   definitions + "(reject (same Nat (down (pow 12)) 1))\n(differ Nat (down (pow 12)) 1)\n",
		"empty.sexp":    "; nothing\n",
	}
	for _, c := range []struct {
		name           string
		args           []string
		stdin          string
		status         int
		stdout, stderr string
	}{
		{"every form as it should be", []string{"good.sexp"}, "", 0,
			"good.sexp:2:1: same two and 2: equal\ngood.sexp:3:1: normal two: 2\ngood.sexp:4:1: reject show berth: refused: nothing of this name is in scope: found berth\n4 forms, each did what it should\n", ""},
		{"forms that fail", []string{"bad.sexp"}, "", 1,
			"bad.sexp:1:17: the type is another: expected Nat, found Unit\nbad.sexp:2:1: not equal by definition, 1 is not 2: expected 1, found 2\nbad.sexp:4:6: nothing of this name is in scope: found drum\nbad.sexp:5:1: show 3: 3 : Nat\n4 forms, of which 3 did not do what they should\n", ""},
		{"text without its end", []string{"open.sexp"}, "", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "open.sexp:2:1: a parenthesis is not closed: expected ), found the end of the text\n"},
		{"text of the wrong form", []string{"head.sexp"}, "", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "head.sexp:2:1: this cannot be read: expected a form of a script, found (elim)\n"},
		{"no such file", []string{"nowhere.sexp"}, "", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "nowhere.sexp: the file cannot be read: no such file or directory\n"},
		{"a directory", []string{"sub"}, "", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "sub: the file cannot be read: is a directory\n"},
		{"standard input", []string{"-"}, "(show (suc 4))", 0, "-:1:1: show (suc 4): 5 : Nat\n1 form, each did what it should\n", ""},
		{"standard input that fails", []string{"-"}, "(show crane)", 1, "-:1:7: nothing of this name is in scope: found crane\n1 form, of which 1 did not do what it should\n", ""},
		{"standard input that is no text", []string{"-"}, "(show \xff)", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "-:1:7: the text is not UTF-8: expected a character in UTF-8, found the byte 0xFF\n"},
		{"a file is loaded once", []string{"load.sexp"}, "", 0,
			"sub/more.sexp:1:1: show 8: 8 : Nat\nload.sexp:3:1: show crane: 7 : Nat\n3 forms, each did what it should\n", ""},
		{"a file that loads itself", []string{"turn.sexp"}, "", 0, "turn.sexp:2:1: show 4: 4 : Nat\n1 form, each did what it should\n", ""},
		{"a load that cannot be read ends the run", []string{"gone.sexp"}, "", 2,
			"gone.sexp:1:1: show 1: 1 : Nat\n1 form, each did what it should\n1 script could not be read to the end\n", "gone.sexp:2:7: the file cannot be read: found \"nowhere.sexp\": no such file or directory\n"},
		{"a load that is to be refused", []string{"try.sexp"}, "", 1,
			"try.sexp:1:1: reject load \"bad.sexp\": refused: the type is another: expected Nat, found Unit\ntry.sexp:2:1: the form was to be refused: found it was accepted\n2 forms, of which 1 did not do what it should\n", ""},
		{"unreadable text is no refusal", []string{"tryopen.sexp"}, "", 2,
			"0 forms, each did what it should\n1 script could not be read to the end\n", "open.sexp:2:1: a parenthesis is not closed: expected ), found the end of the text\n"},
		{"two files do not see each other", []string{"good.sexp", "good.sexp"}, "", 0, "", ""},
		{"the worst status counts", []string{"open.sexp", "bad.sexp", "good.sexp"}, "", 2, "", ""},
		{"nothing to do", []string{"empty.sexp"}, "", 0, "0 forms, each did what it should\n", ""},
		{"a file like a flag", []string{"--", "-x.sexp"}, "", 2, "", "-x.sexp: the file cannot be read: no such file or directory\n"},
	} {
		t.Run(c.name, func(t *testing.T) {
			t.Parallel()
			cmd := command(t, files, c.args...)
			cmd.Stdin = strings.NewReader(c.stdin)
			got := finish(t, cmd)
			assert.Equal(t, c.status, got.status, "%s%s", got.stdout, got.stderr)
			if c.stdout != "" {
				assert.Equal(t, c.stdout, got.stdout)
			}
			if c.stderr != "" || c.status < unreadable {
				assert.Equal(t, c.stderr, got.stderr)
			}
		})
	}
	t.Run("running out of a budget is no refusal", func(t *testing.T) {
		got := finish(t, command(t, files, "-steps", "2000", "budget.sexp"))
		assert.Equal(t, 1, got.status)
		assert.Regexp(t, `(?m)^budget.sexp:6:\d+: .*at most 2000 steps`, got.stdout)
		assert.Regexp(t, `(?m)^budget.sexp:7:\d+: .*at most 2000 steps`, got.stdout)
		assert.Contains(t, got.stdout, "6 forms, of which 2 did not do what they should")
	})
}

func TestFlags(t *testing.T) {
	file := map[string]string{"a.sexp": "(def two Nat 2) (show two)"}
	run := func(args ...string) outcome { return finish(t, command(t, file, args...)) }

	t.Run("time only when asked for", func(t *testing.T) {
		time := regexp.MustCompile(`\[[0-9.]+(ns|µs|ms|s)\]`)
		assert.NotRegexp(t, time, run("a.sexp").stdout)
		assert.Regexp(t, time, run("-time", "a.sexp").stdout)
	})
	t.Run("every form", func(t *testing.T) {
		assert.Contains(t, run("-v", "a.sexp").stdout, "a.sexp:1:1: def two\n")
		assert.NotContains(t, run("a.sexp").stdout, "def two")
	})
	t.Run("help is no failure", func(t *testing.T) {
		got := run("-h")
		assert.Zero(t, got.status)
		assert.Contains(t, got.stderr, "Usage: script")
	})
	for _, args := range [][]string{{}, {"-nonsense", "a.sexp"}, {"-steps", "many", "a.sexp"}, {"-steps", "-1", "a.sexp"}, {"-timeout", "-1s", "a.sexp"}} {
		got := run(args...)
		assert.Equal(t, unreadable, got.status, args)
		assert.NotEmpty(t, got.stderr)
		assert.Empty(t, got.stdout)
	}
	t.Run("quiet in a pipe", func(t *testing.T) {
		got := run("a.sexp")
		assert.Empty(t, got.stderr)
		assert.NotContains(t, got.stdout, "\r")
	})
}

// definitions of programs that take as long as one likes.
const definitions = `
(def add (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero n) ((suc k h) (suc h)))))
(def mul (-> Nat Nat Nat) (lam (m n) (elim (x Nat) m (zero 0) ((suc k h) (add n h)))))
(def pow (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 1) ((suc k h) (mul 2 h)))))
(def down (-> Nat Nat) (lam (n) (elim (x Nat) n (zero 0) ((suc k h) (elim (y Nat) h (zero 0) ((suc m g) m))))))
`

// endless takes far longer than any test.
const endless = definitions + `(show 1)
(same Nat (down (pow 60)) 0)
(show 2)
`

func TestStopping(t *testing.T) {
	file := map[string]string{"endless.sexp": endless}
	t.Run("by the time", func(t *testing.T) {
		t.Parallel()
		got := finish(t, command(t, file, "-timeout", "300ms", "endless.sexp"))
		assert.Equal(t, bad, got.status)
		assert.Contains(t, got.stdout, "show 1: 1 : Nat")
		assert.NotContains(t, got.stdout, "show 2", "what comes after is not begun")
		assert.Regexp(t, `(?m)^endless.sexp:7:1: cancelled: `, got.stdout)
		assert.Contains(t, got.stdout, "stopped before the end: the time of 300ms is used up")
	})
	t.Run("by an interrupt", func(t *testing.T) {
		t.Parallel()
		c := command(t, file, "endless.sexp")
		out, err := c.StdoutPipe()
		require.NoError(t, err)
		require.NoError(t, c.Start())
		guard := time.AfterFunc(time.Minute, func() { _ = c.Process.Kill() })
		defer guard.Stop()
		line := make([]byte, len("endless.sexp:6:1: show 1"))
		_, err = out.Read(line)
		require.NoError(t, err)
		require.Equal(t, "endless.sexp:6:1: show 1", string(line), "the first line comes before the run has ended")
		require.NoError(t, c.Process.Signal(syscall.SIGINT))
		var rest bytes.Buffer
		_, err = rest.ReadFrom(out)
		require.NoError(t, err)
		_ = c.Wait()
		assert.Equal(t, bad, c.ProcessState.ExitCode())
		assert.Contains(t, rest.String(), "stopped before the end")
	})
}

// Progress is shown where a person looks on, and wiped away before a result.
func TestProgress(t *testing.T) {
	assert.Nil(t, newProgress(&bytes.Buffer{}, &bytes.Buffer{}))
	null, err := os.Open(os.DevNull)
	require.NoError(t, err)
	defer null.Close()
	assert.False(t, isTerminal(null))
	var none *progress
	none.show("nothing")
	none.stop()

	r, w, err := os.Pipe()
	require.NoError(t, err)
	p := &progress{out: w}
	p.show("quay.sexp:1:1: form 1: show drum")
	buffer := make([]byte, 256)
	n, err := r.Read(buffer)
	require.NoError(t, err)
	assert.Contains(t, string(buffer[:n]), "form 1: show drum")
	p.clear()
	n, err = r.Read(buffer)
	require.NoError(t, err)
	assert.True(t, strings.HasSuffix(string(buffer[:n]), "\r\x1b[K"))
}
