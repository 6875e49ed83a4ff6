package card

import (
	"fmt"
	"io"
	"io/fs"
	"time"

	"github.com/go-pdf/fpdf"

	"clampback/planner"
	"clampback/report/figure"
	"clampback/templates"
)

// Options says how cards are printed; the zero value is an A5 card without a
// calculation page.
type Options struct {
	Paper          Paper
	WithDiagram    bool  // add calculation pages with the joint diagram and, of a cyclic load, the fatigue diagrams
	ShowInfeasible bool  // print a page that forbids tightening, instead of an error
	Templates      fs.FS // a folder that overrides the built-in words file by file; nil: none
}

// Write writes one joint's card as a document. An infeasible joint is an error,
// unless ShowInfeasible.
func Write(w io.Writer, plan planner.Plan, o Options) error {
	return write(w, []planner.Plan{plan}, o, plan.ID+" "+plan.Name)
}

// WriteTogether writes the cards of all joints as one document with a bookmark
// for each joint; pages are numbered a joint.
func WriteTogether(w io.Writer, plans []planner.Plan, o Options) error {
	joints := make([]planner.Joint, len(plans))
	for i, p := range plans {
		joints[i] = p.Joint
	}
	return write(w, plans, o, planner.Headings(joints).Assembly)
}

func write(w io.Writer, plans []planner.Plan, o Options, title string) error {
	d, err := newDocument(o, title)
	if err != nil {
		return err
	}
	for _, p := range plans {
		if !p.Feasible && !o.ShowInfeasible {
			return fmt.Errorf("joint %s is infeasible and gets no card", p.ID)
		}
		if err := d.joint(p); err != nil {
			return fmt.Errorf("the card of joint %s: %w", p.ID, err)
		}
	}
	return d.pdf.Output(w)
}

// document is a PDF while it is written.
type document struct {
	pdf      *fpdf.Fpdf
	canvas   *figure.PDF
	words    *phrases
	cautions []caution
	options  Options
	paper    Paper
	bodySize float64 // of body type on A5, mm
}

func newDocument(o Options, title string) (*document, error) {
	if o.Paper.width == 0 {
		o.Paper = A5
	}
	words, err := readPhrases(templates.Folder(o.Templates), "en")
	if err != nil {
		return nil, err
	}
	cautions, err := readCautions(templates.Folder(o.Templates))
	if err != nil {
		return nil, err
	}
	pdf := fpdf.NewCustom(&fpdf.InitType{UnitStr: "mm", Size: fpdf.SizeType{Wd: o.Paper.width, Ht: o.Paper.height}})
	// The document depends on the plans alone: fixed dates, fixed order.
	date := time.Date(2026, time.January, 1, 0, 0, 0, 0, time.UTC)
	pdf.SetCreationDate(date)
	pdf.SetModificationDate(date)
	pdf.SetCatalogSort(true)
	pdf.SetProducer("clampback", true)
	pdf.SetTitle(figure.Printable(title), true)
	pdf.SetAutoPageBreak(false, 0)
	return &document{pdf, figure.NewPDF(pdf), words, cautions, o, o.Paper, bodySize}, nil
}

// joint writes all pages of a joint.
func (d *document) joint(p planner.Plan) error {
	var sheets []sheet
	if p.Feasible {
		sheets = d.paginate(p, d.instruction(p), false)
	} else {
		sheets = d.paginate(p, d.forbidden(p), true)
	}
	if d.options.WithDiagram {
		sheets = append(sheets, d.paginate(p, d.calculation(p), !p.Feasible)...)
	}
	for i, s := range sheets {
		d.pdf.AddPage()
		if i == 0 {
			d.pdf.Bookmark(figure.Printable(p.ID+"  "+p.Name), 0, 0)
		}
		d.print(p, s, i+1, len(sheets))
	}
	if err := d.words.err(); err != nil {
		return err
	}
	return d.pdf.Error()
}
