// Package table reads the tables that are part of the program: embedded CSV
// with a head of comments, a line of column names, and rows.
//
// In: a file of an embedded folder. Out: rows by column name. It panics on a
// damaged table: the tables are as much the program as its code, and the tests
// read every row of every one. It never reads what a user wrote.
package table

import (
	"encoding/csv"
	"fmt"
	"io/fs"
	"strconv"
)

// Row is one line of a table by column name.
type Row map[string]string

// Read returns the rows of a table.
func Read(folder fs.FS, name string) []Row {
	file, err := folder.Open(name)
	if err != nil {
		panic(fmt.Sprintf("embedded table: %v", err))
	}
	r := csv.NewReader(file)
	r.Comment = '#'
	records, err := r.ReadAll()
	if err != nil {
		panic(fmt.Sprintf("embedded table %s: %v", name, err))
	}
	rows := make([]Row, 0, len(records))
	for _, record := range records[1:] {
		row := Row{}
		for i, column := range records[0] {
			row[column] = record[i]
		}
		rows = append(rows, row)
	}
	return rows
}

// Text returns a column as written. It panics on a column that the table does
// not have.
func (r Row) Text(column string) string {
	value, found := r[column]
	if !found {
		panic(fmt.Sprintf("embedded table: no column %s", column))
	}
	return value
}

// Number returns a column as a number; an empty cell is 0, "not known".
func (r Row) Number(column string) float64 {
	text := r.Text(column)
	if text == "" {
		return 0
	}
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		panic(fmt.Sprintf("embedded table, column %s: %v", column, err))
	}
	return v
}
