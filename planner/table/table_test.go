package table_test

import (
	"testing"
	"testing/fstest"

	"github.com/stretchr/testify/assert"

	"clampback/planner/table"
)

func TestRead(t *testing.T) {
	rows := table.Read(fstest.MapFS{"a.csv": {Data: []byte("# head\nname,size\nx,1.5\ny,\n")}}, "a.csv")
	assert.Len(t, rows, 2)
	assert.Equal(t, "x", rows[0].Text("name"))
	assert.InDelta(t, 1.5, rows[0].Number("size"), 0)
	assert.Zero(t, rows[1].Number("size"))
	assert.Panics(t, func() { rows[0].Text("colour") })
	assert.Panics(t, func() { rows[0].Number("name") })
	assert.Panics(t, func() { table.Read(fstest.MapFS{}, "a.csv") })
	assert.Panics(t, func() { table.Read(fstest.MapFS{"a.csv": {Data: []byte("a,b\n1\n")}}, "a.csv") })
}
