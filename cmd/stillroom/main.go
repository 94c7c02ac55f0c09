// Command stillroom plans preparative chemistry runs against the shelf.
package main

func main() {}
