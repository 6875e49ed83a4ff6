// Package templates holds what a user may read, copy and change: the formulas
// of the workbook, the words of the cards, the cautions. They are data; the
// rooms that use them check them.
package templates

import (
	"embed"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"io/fs"
)

// files is the folder as it stands in the repository, without the Go file.
//
//go:embed *.csv cards/*.csv
var files embed.FS

// Folder returns the templates, with the files of a user's folder in place of
// those of the same name. A nil folder changes nothing.
func Folder(user fs.FS) fs.FS {
	if user == nil {
		return files
	}
	return overlay{user}
}

// overlay looks for a file in the user's folder first.
type overlay struct{ user fs.FS }

// Open implements fs.FS.
func (o overlay) Open(name string) (fs.File, error) {
	f, err := o.user.Open(name)
	if errors.Is(err, fs.ErrNotExist) {
		return files.Open(name)
	}
	return f, err
}

// Rows reads a template that is a table: comments, a line of column names, and
// rows of so many columns, each with a key of its own in the first. A mistake is
// an error with the file and the line.
func Rows(folder fs.FS, name string, columns int) ([][]string, error) {
	file, err := folder.Open(name)
	if err != nil {
		return nil, fmt.Errorf("reading a template: %w", err)
	}
	// Only read, so closing it cannot lose anything.
	defer func() { _ = file.Close() }()
	r := csv.NewReader(file)
	r.Comment = '#'
	r.FieldsPerRecord = columns
	var rows [][]string
	seen := map[string]bool{}
	for {
		record, err := r.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return nil, fmt.Errorf("%s: %w", name, err)
		}
		line, _ := r.FieldPos(0)
		if seen[record[0]] {
			return nil, fmt.Errorf("%s:%d: %q stands twice", name, line, record[0])
		}
		seen[record[0]] = true
		rows = append(rows, record)
	}
	if len(rows) < 2 {
		return nil, fmt.Errorf("%s has no lines below its column names", name)
	}
	return rows[1:], nil
}
