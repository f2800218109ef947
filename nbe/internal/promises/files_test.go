package promises

// Files of an adversary: what cannot be read is told with an error, and nothing
// waits for what never comes.

import (
	"context"
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"testing"
	"time"

	"github.com/stretchr/testify/require"
	"go.uber.org/goleak"

	"example.com/boxwright/nbe/script"
	"example.com/boxwright/nbe/term"
)

func loadFrom(t testing.TB, ctx context.Context, s *script.Session, name string) error {
	if s.Engine == nil {
		s.Engine = mustNew(t)
	}
	return s.Source(ctx, []byte(`(load "`+name+`")`), "here")
}

func TestFilesThatCannotBeRead(t *testing.T) {
	dir := t.TempDir()
	require.NoError(t, os.Symlink(filepath.Join(dir, "nowhere"), filepath.Join(dir, "dangling")))
	require.NoError(t, os.Symlink(filepath.Join(dir, "round"), filepath.Join(dir, "round")))
	require.NoError(t, os.WriteFile(filepath.Join(dir, "plain"), nil, 0o600))
	for _, name := range []string{"nowhere", "dangling", "round", ".", "plain/inside"} {
		err := loadFrom(t, context.Background(), &script.Session{}, filepath.Join(dir, name))
		require.Equal(t, term.Unreadable, term.KindOf(err), "%s: %v", name, err)
		var e *term.Error
		require.ErrorAs(t, err, &e)
		require.Equal(t, 1, e.Place.Line, "the form that names the file is blamed")
		require.Equal(t, "here", e.Place.File)
	}
	for _, cause := range []error{fs.ErrPermission, fs.ErrClosed, errors.New("the disk is wet"), &fs.PathError{Op: "open", Path: "x", Err: fs.ErrPermission}} {
		err := loadFrom(t, context.Background(), &script.Session{ReadFile: func(string) ([]byte, error) { return nil, cause }}, "x")
		require.Equal(t, term.Unreadable, term.KindOf(err))
		if !errors.As(cause, new(*fs.PathError)) {
			require.ErrorIs(t, err, cause)
		}
		require.Error(t, err)
	}
	if os.Getuid() > 0 {
		require.NoError(t, os.WriteFile(filepath.Join(dir, "closed"), nil, 0))
		require.Equal(t, term.Unreadable, term.KindOf(loadFrom(t, context.Background(), &script.Session{}, filepath.Join(dir, "closed"))))
	}
}

// A named pipe without a writer is empty; with one that says nothing, the
// context ends the wait; a device without end is too long.
func TestFilesWithoutEnd(t *testing.T) {
	if runtime.GOOS != "linux" {
		t.Skip("has no named pipes, or others")
	}
	defer goleak.VerifyNone(t, goleak.IgnoreCurrent())
	pipe := filepath.Join(t.TempDir(), "pipe")
	require.NoError(t, mkfifo(pipe))
	require.NoError(t, loadFrom(t, context.Background(), &script.Session{}, pipe))
	writer, err := os.OpenFile(pipe, os.O_RDWR, 0)
	require.NoError(t, err)
	defer writer.Close()
	ctx, cancel := context.WithCancelCause(context.Background())
	time.AfterFunc(10*time.Millisecond, func() { cancel(errQuayClosed) })
	err = loadFrom(t, ctx, &script.Session{}, pipe)
	require.Equal(t, term.Cancelled, term.KindOf(err), "%v", err)
	require.ErrorIs(t, err, errQuayClosed)
	ctx, cancel = context.WithCancelCause(context.Background())
	time.AfterFunc(10*time.Millisecond, func() { cancel(errQuayClosed) })
	err = loadFrom(t, ctx, &script.Session{}, "/dev/zero")
	require.Equal(t, term.Cancelled, term.KindOf(err), "%v", err)
	if long {
		err = loadFrom(t, context.Background(), &script.Session{}, "/dev/zero")
		require.Equal(t, term.Unreadable, term.KindOf(err), "%v", err)
	}
}
