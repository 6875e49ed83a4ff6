package templates_test

import (
	"testing"
	"testing/fstest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/templates"
)

func TestEveryTemplateReads(t *testing.T) {
	for name, columns := range map[string]int{"calculation.csv": 2, "checks.csv": 3, "cautions.csv": 4, "cards/en.csv": 2} {
		rows, err := templates.Rows(templates.Folder(nil), name, columns)
		require.NoError(t, err)
		for _, r := range rows {
			for _, text := range r {
				assert.NotEmpty(t, text, "%s: %v", name, r)
			}
		}
	}
}

func TestUserFolderOverridesFileByFile(t *testing.T) {
	folder := templates.Folder(fstest.MapFS{"checks.csv": {Data: []byte("rule,value,limit\na,b,c\n")}})
	rows, err := templates.Rows(folder, "checks.csv", 3)
	require.NoError(t, err)
	assert.Equal(t, [][]string{{"a", "b", "c"}}, rows)
	_, err = templates.Rows(folder, "cautions.csv", 4)
	assert.NoError(t, err, "the built-in file")
}

func TestMistakesHaveFileAndLine(t *testing.T) {
	read := func(text string) error {
		_, err := templates.Rows(fstest.MapFS{"a.csv": {Data: []byte(text)}}, "a.csv", 2)
		return err
	}
	assert.EqualError(t, read("k,v\na,1\na,2\n"), `a.csv:3: "a" stands twice`)
	assert.ErrorContains(t, read("k,v\na,1,2\n"), "a.csv: record on line 2: wrong number of fields")
	assert.EqualError(t, read("k,v\n"), "a.csv has no lines below its column names")
	_, err := templates.Rows(fstest.MapFS{}, "a.csv", 2)
	assert.ErrorContains(t, err, "reading a template")
}
