package main

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A file that a register names counts from the register's folder, unless its name
// is absolute; what is no file or too large is refused before it is read.
func TestBeside(t *testing.T) {
	folder := t.TempDir()
	plant, table := filepath.Join(folder, "plant"), filepath.Join(folder, "forces.csv")
	require.NoError(t, os.Mkdir(plant, 0o755))
	require.NoError(t, os.WriteFile(table, []byte("bolt\n"), 0o644))
	open := beside(plant)
	for _, name := range []string{table, "../forces.csv", "./../plant/../forces.csv"} {
		data, err := open(name)
		require.NoError(t, err, name)
		assert.Equal(t, "bolt\n", string(data), name)
	}
	_, err := open("forces.csv")
	require.ErrorIs(t, err, os.ErrNotExist)
	assert.EqualError(t, err, filepath.Join(plant, "forces.csv")+": no such file or directory")

	_, err = open("..")
	assert.EqualError(t, err, folder+" is no file")
	require.NoError(t, os.Truncate(table, maxBeside+1))
	_, err = open(table)
	assert.EqualError(t, err, table+" is larger than 200 MB")
	require.NoError(t, os.Truncate(table, maxBeside))
	data, err := open(table)
	require.NoError(t, err)
	assert.Len(t, data, maxBeside)
}
