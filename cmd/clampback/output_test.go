package main

import (
	"bytes"
	"context"
	"errors"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// files lists everything in a folder, hidden files too.
func files(t *testing.T, dir string) []string {
	entries, err := os.ReadDir(dir)
	require.NoError(t, err)
	var names []string
	for _, e := range entries {
		names = append(names, e.Name())
	}
	return names
}

// put returns a function that writes a text.
func put(text string) func(io.Writer) error {
	return func(w io.Writer) error {
		_, err := io.WriteString(w, text)
		return err
	}
}

func TestFailedWriteLeavesTheOldFile(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "plan.pdf")
	require.NoError(t, os.WriteFile(path, []byte("old"), 0o600))
	err := writeFile(t.Context(), path, nil, func(w io.Writer) error {
		_, err := w.Write(bytes.Repeat([]byte("x"), 1<<20))
		require.NoError(t, err)
		return syscall.ENOSPC
	})
	assert.ErrorIs(t, err, syscall.ENOSPC)
	content, err := os.ReadFile(path)
	require.NoError(t, err)
	assert.Equal(t, "old", string(content))
	assert.Equal(t, []string{"plan.pdf"}, files(t, dir))
}

// A full disk: the kernel's own error, through the same writer.
func TestFullDiskIsReported(t *testing.T) {
	full, err := os.OpenFile("/dev/full", os.O_WRONLY, 0)
	require.NoError(t, err)
	defer full.Close()
	_, err = stoppable{t.Context(), full}.Write([]byte("x"))
	assert.ErrorIs(t, err, syscall.ENOSPC)

	// A batch whose file meets the full disk names it, and leaves nothing behind.
	dir := filepath.Join(t.TempDir(), "cards")
	b, err := newBatch(t.Context(), dir)
	require.NoError(t, err)
	err = b.Write("a.pdf", func(w io.Writer) error {
		_, err := io.Copy(full, strings.NewReader("x"))
		return err
	})
	assert.ErrorIs(t, err, syscall.ENOSPC)
	assert.ErrorContains(t, err, filepath.Join(dir, "a.pdf"))
	b.Close()
	assert.NoDirExists(t, dir)
}

// Ctrl-C while the program waits for standard input ends it: status 130.
func TestCtrlCWhileWaitingForInput(t *testing.T) {
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	waiting, _ := io.Pipe()
	_, err := openSource(ctx, waiting, "-")
	assert.ErrorIs(t, err, context.Canceled)
}

func TestInterruptLeavesNothing(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "cards")
	ctx, cancel := context.WithCancel(t.Context())
	b, err := newBatch(ctx, dir)
	require.NoError(t, err)
	require.NoError(t, b.Write("a.pdf", put("a")))
	cancel()
	err = b.Write("b.pdf", put("b"))
	assert.ErrorIs(t, err, context.Canceled)
	assert.ErrorIs(t, b.Commit(), context.Canceled)
	b.Close()
	assert.NoDirExists(t, dir)
}

// A Commit that fails half way puts the old files back and takes new ones away.
func TestFailedCommitRestores(t *testing.T) {
	dir := t.TempDir()
	require.NoError(t, os.WriteFile(filepath.Join(dir, "a"), []byte("old a"), 0o600))
	require.NoError(t, os.WriteFile(filepath.Join(dir, "stale"), []byte("old stale"), 0o600))
	b, err := newBatch(t.Context(), dir)
	require.NoError(t, err)
	for _, name := range []string{"a", "b", "c"} {
		require.NoError(t, b.Write(name, put("new "+name)))
	}
	require.True(t, b.Remove("stale"))
	require.NoError(t, os.Remove(b.staged("c"))) // lost, as by a failing disk
	require.Error(t, b.Commit())
	b.Close()
	assert.Equal(t, []string{"a", "stale"}, files(t, dir))
	for name, want := range map[string]string{"a": "old a", "stale": "old stale"} {
		content, err := os.ReadFile(filepath.Join(dir, name))
		require.NoError(t, err)
		assert.Equal(t, want, string(content))
	}
}

func TestFoldersMadeForNothingGo(t *testing.T) {
	dir := t.TempDir()
	b, err := newBatch(t.Context(), filepath.Join(dir, "p", "q", "r"))
	require.NoError(t, err)
	b.Close()
	assert.Empty(t, files(t, dir))
}

func TestCommittedFilesArePlain(t *testing.T) {
	dir := t.TempDir()
	require.NoError(t, writeFile(t.Context(), filepath.Join(dir, "a"), nil, put("a")))
	assert.Equal(t, []string{"a"}, files(t, dir))
	info, err := os.Stat(filepath.Join(dir, "a"))
	require.NoError(t, err)
	assert.Equal(t, os.FileMode(0o644), info.Mode().Perm())
}

// Ctrl-C in the middle of a large batch of cards, with the program as a process:
// status 130, and the folder it was about to make is gone.
func TestCtrlCDuringCards(t *testing.T) {
	dir := t.TempDir()
	demo, err := os.ReadFile("../../testdata/demo/tarn40.yaml")
	require.NoError(t, err)
	head, joints, found := strings.Cut(string(demo), "joints:\n")
	require.True(t, found)
	var many strings.Builder
	many.WriteString(head + "joints:\n")
	for i := range 200 {
		many.WriteString(strings.ReplaceAll(joints, "id: TRN-", "id: T"+string(rune('A'+i%26))+string(rune('A'+i/26))+"-"))
	}
	register := filepath.Join(dir, "many.yaml")
	require.NoError(t, os.WriteFile(register, []byte(many.String()), 0o600))
	program := filepath.Join(dir, "clampback")
	output, err := exec.Command("go", "build", "-o", program, ".").CombinedOutput()
	require.NoError(t, err, "%s", output)

	cards := filepath.Join(dir, "cards")
	command := exec.Command(program, "card", register, "--out", cards)
	var stderr bytes.Buffer
	command.Stderr = &stderr
	require.NoError(t, command.Start())
	// Wait until the first card is staged, then interrupt.
	require.Eventually(t, func() bool {
		staged, _ := filepath.Glob(filepath.Join(cards, ".clampback-*", "*.pdf"))
		return len(staged) > 0
	}, 20*time.Second, time.Millisecond, "%s", &stderr)
	require.NoError(t, command.Process.Signal(os.Interrupt))
	var exit *exec.ExitError
	require.True(t, errors.As(command.Wait(), &exit), "%s", &stderr)
	assert.Equal(t, exitInterrupted, exit.ExitCode(), "%s", &stderr)
	assert.Contains(t, stderr.String(), "interrupted")
	assert.NoDirExists(t, cards)
}
