package views

import (
	"net/http"
	"strconv"
	"time"

	"github.com/gin-gonic/gin"
	"github.com/prometheus/client_golang/prometheus"
	"github.com/prometheus/client_golang/prometheus/collectors"
	"github.com/prometheus/client_golang/prometheus/promhttp"
)

// meters count the answers and how long they took, by route, so that no name of
// a bottle or a run becomes a label.
type meters struct {
	registry *prometheus.Registry
	seconds  *prometheus.HistogramVec
}

func newMeters() *meters {
	m := &meters{
		registry: prometheus.NewRegistry(),
		seconds: prometheus.NewHistogramVec(prometheus.HistogramOpts{
			Name:    "stillroom_answer_seconds",
			Help:    "Time to answer a request, by route and status.",
			Buckets: []float64{.001, .0025, .005, .01, .015, .025, .05, .1, .3, 1, 3},
		}, []string{"route", "method", "status"}),
	}
	m.registry.MustRegister(m.seconds, collectors.NewGoCollector(), collectors.NewProcessCollector(collectors.ProcessCollectorOpts{}))
	return m
}

func (m *meters) handler() http.Handler {
	return promhttp.HandlerFor(m.registry, promhttp.HandlerOpts{})
}

// measured times every answer.
func (s *Server) measured(c *gin.Context) {
	start := time.Now()
	c.Next()
	route := c.FullPath()
	if route == "" {
		route = "none"
	}
	s.meters.seconds.WithLabelValues(route, knownMethod(c.Request.Method), strconv.Itoa(c.Writer.Status())).Observe(time.Since(start).Seconds())
}

// knownMethod keeps a stranger from filling the meters with made-up methods.
func knownMethod(method string) string {
	switch method {
	case http.MethodGet, http.MethodHead, http.MethodPost:
		return method
	}
	return "other"
}
