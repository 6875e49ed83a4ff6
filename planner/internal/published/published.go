// Package published gives tests the figures in testdata/published: values
// printed in standards, guidelines and textbooks, one CSV file a subject, each
// row with its source. In: a file name. Out: rows by column name, as printed.
// Only tests may use it.
package published

import (
	"bytes"
	"encoding/csv"
	"os"
	"path/filepath"
	"runtime"
	"strconv"
	"strings"
	"testing"
)

// Rows returns the rows of testdata/published/name by column. It ends the test
// when the file is missing, damaged or empty, so that a test over its rows can
// never pass by checking nothing.
func Rows(t testing.TB, name string) []map[string]string {
	t.Helper()
	_, here, _, ok := runtime.Caller(0)
	if !ok {
		t.Fatal("the place of the sources is not known")
	}
	data, err := os.ReadFile(filepath.Join(filepath.Dir(here), "..", "..", "..", "testdata", "published", name))
	if err != nil {
		t.Fatal(err)
	}
	r := csv.NewReader(bytes.NewReader(data))
	r.Comment = '#'
	records, err := r.ReadAll()
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	if len(records) < 2 {
		t.Fatalf("%s has no rows", name)
	}
	var rows []map[string]string
	for _, record := range records[1:] {
		row := map[string]string{}
		for i, column := range records[0] {
			row[column] = record[i]
		}
		rows = append(rows, row)
	}
	return rows
}

// Number returns a figure as printed and half a unit of its last digit: the
// error that printing alone explains.
func Number(t testing.TB, row map[string]string, column string) (value, halfDigit float64) {
	t.Helper()
	text := row[column]
	value, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatalf("column %s: %v in row %v", column, err, row)
	}
	halfDigit = 0.5
	if _, decimals, found := strings.Cut(text, "."); found {
		for range decimals {
			halfDigit /= 10
		}
	}
	return value, halfDigit
}
