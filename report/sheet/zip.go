package sheet

import (
	"archive/zip"
	"bytes"
	"io"
	"io/fs"
	"regexp"
	"slices"

	"github.com/xuri/excelize/v2"
)

// sortedZip writes the entries of a workbook in the order of their names, so that
// the same workbook has the same bytes: the library walks maps.
type sortedZip struct {
	w       io.Writer
	entries map[string]*bytes.Buffer
}

func newSortedZip(w io.Writer) excelize.ZipWriter {
	return &sortedZip{w, map[string]*bytes.Buffer{}}
}

// Create adds an entry.
func (z *sortedZip) Create(name string) (io.Writer, error) {
	b := &bytes.Buffer{}
	z.entries[name] = b
	return b, nil
}

// AddFS adds the files of a folder; the library uses it for nothing that this
// package writes.
func (z *sortedZip) AddFS(folder fs.FS) error {
	return fs.WalkDir(folder, ".", func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		data, err := fs.ReadFile(folder, path)
		if err != nil {
			return err
		}
		z.entries[path] = bytes.NewBuffer(data)
		return nil
	})
}

// Close writes the archive. Entries carry no time.
func (z *sortedZip) Close() error {
	names := make([]string, 0, len(z.entries))
	for name := range z.entries {
		names = append(names, name)
	}
	slices.Sort(names)
	archive := zip.NewWriter(z.w)
	for _, name := range names {
		data := z.entries[name].Bytes()
		if name == "[Content_Types].xml" {
			data = sortContentTypes(data)
		}
		entry, err := archive.CreateHeader(&zip.FileHeader{Name: name, Method: zip.Deflate})
		if err != nil {
			return err
		}
		if _, err := entry.Write(data); err != nil {
			return err
		}
	}
	return archive.Close()
}

// sortContentTypes orders the elements of the list of parts.
func sortContentTypes(data []byte) []byte {
	part := regexp.MustCompile(`<(?:Default|Override) [^>]*(?:/>|></(?:Default|Override)>)`)
	parts := part.FindAll(data, -1)
	slices.SortFunc(parts, bytes.Compare)
	next := -1
	return part.ReplaceAllFunc(data, func([]byte) []byte {
		next++
		return parts[next]
	})
}
