package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"log/slog"
	"net"
	"net/http"
	"time"

	"github.com/spf13/cobra"

	"stillroom/inventory"
	"stillroom/planner"
	"stillroom/planner/reckoner"
	"stillroom/views"
)

// defaultListen is the address of the design's contract.
const defaultListen = "127.0.0.1:8087"

// The limits of the server: a page is small, a form too, and a paper takes
// well under a second.
const (
	readTimeout  = 30 * time.Second
	writeTimeout = 2 * time.Minute
	idleTimeout  = 2 * time.Minute
	lastOrders   = 10 * time.Second // for requests under way when the server is stopped
)

func newServe(today func() inventory.Date) *cobra.Command {
	var o dataOptions
	var listen string
	cmd := &cobra.Command{
		Use:   "serve --data DIR [--listen ADDR] [--database URL]",
		Short: "Serve the lab's pages from the data in a folder",
		Args:  exactly(0, "no arguments"),
		RunE: func(cmd *cobra.Command, _ []string) error {
			if err := onlyLoopback(listen); err != nil {
				return err
			}
			store, err := o.open(cmd.Context(), "serve")
			if err != nil {
				return err
			}
			defer store.Close()
			return serve(cmd.Context(), store, listen, today, cmd.OutOrStdout())
		},
	}
	cmd.Flags().StringVar(&listen, "listen", defaultListen, "address to listen on")
	o.register(cmd.Flags())
	return cmd
}

// onlyLoopback refuses any address that other machines reach: there is no
// sign-in yet, so whoever reaches the pages may change the stock.
func onlyLoopback(listen string) error {
	host, _, err := net.SplitHostPort(listen)
	if err != nil {
		return usagef("--listen %q: want host:port, such as %s", listen, defaultListen)
	}
	if ip := net.ParseIP(host); host == "localhost" || ip != nil && ip.IsLoopback() {
		return nil
	}
	return usagef("--listen %q: only a loopback address is served until there is sign-in, because whoever reaches the pages may change the stock; use %s", listen, defaultListen)
}

// serve answers the pages until ctx ends, and then lets the requests under way finish.
func serve(ctx context.Context, store *inventory.Store, listen string, today func() inventory.Date, out io.Writer) error {
	handler, err := views.New(views.Config{
		Lab:     store,
		Recipes: planner.Recipes(),
		Sums:    reckoner.Sums(),
		Today:   today,
	})
	if err != nil {
		return err
	}
	listener, err := net.Listen("tcp", listen)
	if err != nil {
		return fmt.Errorf("serve: %w; is another one running? choose a free address with --listen", err)
	}
	server := &http.Server{
		Handler:           handler,
		ReadHeaderTimeout: readTimeout,
		ReadTimeout:       readTimeout,
		WriteTimeout:      writeTimeout,
		IdleTimeout:       idleTimeout,
		ErrorLog:          slog.NewLogLogger(slog.Default().Handler(), slog.LevelWarn),
	}
	fmt.Fprintf(out, "ready: open http://%s in a browser; stop with Ctrl-C\n", listener.Addr())
	return serveUntil(ctx, server, listener)
}

func serveUntil(ctx context.Context, server *http.Server, listener net.Listener) error {
	ended := make(chan error, 1)
	go func() { ended <- server.Serve(listener) }()
	select {
	case err := <-ended:
		return fmt.Errorf("serve: %w", err)
	case <-ctx.Done():
	}
	limited, cancel := context.WithTimeout(context.WithoutCancel(ctx), lastOrders)
	defer cancel()
	if err := server.Shutdown(limited); err != nil {
		return errors.Join(fmt.Errorf("serve: stopping: %w", err), server.Close())
	}
	return nil
}
