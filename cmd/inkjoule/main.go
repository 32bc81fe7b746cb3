// Command inkjoule reviews electromagnetic calculation notes. A file a verb;
// every verb works on the same analysis (lang.Analyze, check.Run).
package main

import (
	"context"
	"os"
	"os/signal"
	"syscall"
)

func main() { os.Exit(run()) }

func run() int {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	return execute(ctx, standard(), os.Args[1:])
}
