package inventory

import (
	"context"
	"os"
)

// backupOld copies a database of an earlier schema before it is changed.
func (s *Store) backupOld(ctx context.Context, base string) error {
	if s.engine == onPostgres || s.options.Memory {
		return nil
	}
	if _, err := os.Stat(base + ".db"); err == nil {
		return nil
	}
	_, err := s.pools[0].ExecContext(ctx, "VACUUM INTO ?", base+".db")
	return err
}
