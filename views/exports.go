package views

import (
	"bytes"
	"io"
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
)

// stockFormats are the forms in which the shelf leaves the program, by the names
// of the files.
var stockFormats = []struct {
	file, kind string
	write      func(io.Writer, *inventory.Shelf) error
}{
	{"shelf.csv", "text/csv; charset=utf-8; header=present", inventory.ExportCSV},
	{"shelf.xlsx", "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet", inventory.ExportXLSX},
	{"shelf.json", "application/json", inventory.ExportJSON},
}

// exportStock makes the handler of one form. The whole shelf goes out, whatever
// the page was filtered by: a list with silent gaps is worse than a long one.
func (s *Server) exportStock(i int) func(*gin.Context) error {
	f := stockFormats[i]
	return func(c *gin.Context) error {
		shelf, err := s.Lab.Load(c.Request.Context())
		if err != nil {
			return err
		}
		var b bytes.Buffer
		if err := f.write(&b, shelf); err != nil {
			return err
		}
		c.Header("Content-Disposition", `attachment; filename="`+s.Today().String()+" "+f.file+`"`)
		c.Data(http.StatusOK, f.kind, b.Bytes())
		return nil
	}
}
