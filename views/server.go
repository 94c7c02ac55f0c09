// Package views shows the lab to people: pages that a server renders and htmx
// shortens the way to, drawings that are computed from the numbers beside them,
// papers to print, and the plan as JSON.
//
// A page is a typed value that embeds frame; a handler reads the request, calls
// one function of the planner or the stock records, and renders the value with
// the template of its name. The same address answers a whole page or, when htmx
// asks for a part of it, the block of that name. Everything works without
// JavaScript.
//
// No chemistry and no SQL live here: numbers come from the planner and are only
// rounded for the eye.
package views

import (
	"context"
	"errors"
	"log/slog"
	"net/http"
	"time"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
	"stillroom/planner/reckoner"
	"stillroom/static"
)

// Config is what a Server needs. Lab and Today must be set.
type Config struct {
	Lab Lab
	// Plan makes a plan for a request; nil means that a run is planned among the
	// others of the slate, which is what the program does.
	Plan func(planner.Request, *inventory.Shelf) (*planner.Plan, error)
	// Recipes are those that come with the program; what the lab saved is added.
	Recipes []*planner.Recipe
	Sums    []reckoner.Sum
	// Today gives the present day of the lab.
	Today func() inventory.Date
	// Now is the clock that papers are stamped by; nil means the system's.
	Now func() time.Time
	// Address is where people reach the program, such as
	// "https://stillroom.lab.example", for the codes on papers; "" takes what the
	// browser used.
	Address string
	// Log takes what went wrong; nil means the default logger.
	Log *slog.Logger
}

// Server answers the pages. It is safe for use by several requests at once.
type Server struct {
	Config
	sets    templateSets
	meters  *meters
	memory  *memory
	book    recipeBook
	handler http.Handler
}

// New checks the configuration, reads the templates and joins the routes.
func New(c Config) (*Server, error) {
	if c.Lab == nil || c.Today == nil {
		return nil, errors.New("views: Lab and Today have to be set")
	}
	if c.Now == nil {
		c.Now = time.Now
	}
	if c.Log == nil {
		c.Log = slog.Default()
	}
	sets, err := parseTemplates()
	if err != nil {
		return nil, err
	}
	s := &Server{Config: c, sets: sets, meters: newMeters(), memory: newMemory()}
	s.handler = secured(s.routes())
	return s, nil
}

// ServeHTTP implements http.Handler.
func (s *Server) ServeHTTP(w http.ResponseWriter, r *http.Request) { s.handler.ServeHTTP(w, r) }

// routes is the whole list of addresses.
func (s *Server) routes() http.Handler {
	gin.SetMode(gin.ReleaseMode)
	e := gin.New()
	e.HandleMethodNotAllowed = true
	e.Use(s.recovered, s.measured)

	e.GET("/", redirectTo("/slate"))
	e.GET("/slate", s.page(s.showSlate))

	e.GET("/runs", redirectTo("/slate"))
	e.GET("/runs/new", s.page(s.newRun))
	e.POST("/runs/new", s.page(s.addRun))
	e.GET("/runs/:id", s.page(s.showRun))
	e.POST("/runs/:id", s.page(s.keepRun))
	e.POST("/runs/:id/stand", s.page(s.moveRun))
	for _, file := range []string{"pick-list.pdf", "hazard-sheet.pdf", "requisition.pdf"} {
		e.GET("/runs/:id/"+file, s.page(s.showPaper(file)))
	}
	e.GET("/runs/:id/answers", s.page(s.showAnswers))
	e.GET("/runs/:id/steps/:n", s.page(s.showStep))
	e.GET("/runs/:id/chance", s.page(s.showChance))
	e.GET("/runs/:id/hazards", s.page(s.showHazards))
	e.GET("/runs/:id/promise", s.page(s.showPromise))
	e.POST("/runs/:id/promise", s.page(s.promise))
	e.POST("/runs/:id/release", s.page(s.release))
	e.GET("/runs/:id/explain/:what", s.page(s.explain))

	e.GET("/shelf", s.page(s.showShelf))
	for i := range stockFormats {
		e.GET("/"+stockFormats[i].file, s.page(s.exportStock(i)))
	}
	e.GET("/shelf/import", s.page(s.showImport))
	e.POST("/shelf/import", s.page(s.takeImport))
	e.POST("/shelf/import/:id/undo", s.page(s.undoImport))
	e.GET("/shelf/receive", s.page(s.showReceive))
	e.POST("/shelf/receive", s.page(s.takeIn))
	e.GET("/shelf/stock-take", s.page(s.showStockTake))
	e.GET("/shelf/stock-take/:code", s.page(s.showCount))
	e.POST("/shelf/stock-take/:code", s.page(s.takeStock))
	e.GET("/shelf/bottles/:code", s.page(s.showBottle))
	e.GET("/shelf/bottles/:code/label.pdf", s.page(s.showLabel))
	e.POST("/shelf/bottles/:code/count", s.page(s.countBottle))
	e.POST("/shelf/bottles/:code/draw", s.page(s.drawBottle))
	e.POST("/shelf/bottles/:code/back", s.page(s.takeBack))
	e.POST("/shelf/bottles/:code/weigh-out", s.page(s.weighOut))
	e.POST("/shelf/bottles/:code/weigh-in", s.page(s.weighIn))
	e.POST("/shelf/bottles/:code/weigh-forget", s.page(s.forgetWeighing))
	e.POST("/shelf/bottles/:code/state", s.page(s.changeState))
	e.POST("/shelf/bottles/:code/discard", s.page(s.discardBottle))
	e.POST("/shelf/bottles/:code/move", s.page(s.moveBottle))
	e.POST("/shelf/bottles/:code/peroxide", s.page(s.testPeroxide))
	e.GET("/recipes", s.page(s.showRecipes))
	e.GET("/recipes/new", s.page(s.showNew))
	e.POST("/recipes/new", s.page(s.saveNew))
	e.GET("/recipes/:name", s.page(s.showRecipe))
	e.GET("/recipes/:name/difference", s.page(s.showDifference))
	e.GET("/recipes/:name/edit", s.page(s.showEdit))
	e.POST("/recipes/:name/edit", s.page(s.saveEdit))
	e.GET("/shortfalls", s.page(s.showShortfalls))
	e.GET("/buying", s.page(s.showBuying))
	e.GET("/waste", s.page(s.showWaste))
	e.GET("/waste/:code", s.page(s.showCarboy))
	e.POST("/waste/:code/pour", s.page(s.pour))
	e.POST("/waste/:code/collect", s.page(s.collect))
	e.GET("/reckoner", s.page(s.showReckoner))
	e.GET("/reckoner/:sum", s.page(s.showSum))

	e.GET(static.Root+"*file", gin.WrapH(static.Handler()))
	e.GET("/healthz", s.page(s.health))
	e.GET("/metrics", gin.WrapH(s.meters.handler()))

	e.NoRoute(s.page(func(*gin.Context) error { return errNoPage }))
	e.NoMethod(s.page(func(*gin.Context) error { return errNoMethod }))
	return e
}

func redirectTo(address string) gin.HandlerFunc {
	return func(c *gin.Context) { c.Redirect(http.StatusSeeOther, address) }
}

// health answers as long as the stock can be read.
func (s *Server) health(c *gin.Context) error {
	ctx, cancel := context.WithTimeout(c.Request.Context(), 5*time.Second)
	defer cancel()
	if _, err := s.Lab.LoadFor(ctx, nil); err != nil {
		s.Log.Error("health", "cause", err)
		c.String(http.StatusServiceUnavailable, "the stock can't be read\n")
		return nil
	}
	c.String(http.StatusOK, "ok\n")
	return nil
}
