package inventory

import (
	"context"
	"errors"
	"testing"
)

// A bottle goes to the annex and comes back; nothing is lost or doubled on the
// way, even if every step is asked for twice.
func TestLoan(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "permanganate open") // 330 g, 130 of them for run 2
		var promised *PromiseError
		if _, err := s.Lend(ctx, b.Code, demoAnnex, clerk); !errors.As(err, &promised) {
			t.Fatalf("promised and lent: %v", err)
		}
		if err := s.Release(ctx, 2, clerk); err != nil {
			t.Fatal(err)
		}
		if _, err := s.Lend(ctx, b.Code, demoMain, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("lent to its own store: %v", err)
		}
		loan := lendTwice(t, s, b.Code, demoAnnex)
		if out, _ := s.Bottle(ctx, b.Code); out.State != OnLoan || out.Content != 0 {
			t.Errorf("sent: %+v", out)
		}
		if _, err := s.TakeIn(ctx, loan.ID, 5, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("taken in at the lender's: %v", err)
		}
		there := takeInTwice(t, s, loan.ID, 19)
		if there.StoreID != demoAnnex || there.Content != g(330) || there.Code == b.Code || there.State != Opened {
			t.Errorf("taken in: %+v", there)
		}
		if _, err := s.Draw(ctx, Taking{there.Code, g(30), 0}, clerk); err != nil {
			t.Fatal(err)
		}
		back := takeInTwice(t, s, lendTwice(t, s, there.Code, demoMain).ID, 9)
		if back.Code != b.Code || back.Content != g(300) || back.State != Opened {
			t.Errorf("back: %+v", back)
		}
		loans, err := s.Loans(ctx)
		if err != nil || len(loans) != 2 || loans[1].ToBottle != there.ID || loans[0].State != LoanArrived {
			t.Errorf("loans %+v, %v", loans, err)
		}
		mustCheck(t, s)
	})
}

func lendTwice(t *testing.T, s *Store, code string, to int64) Loan {
	t.Helper()
	act := Act{By: "x", Key: "lend " + code}
	loan, err := s.Lend(context.Background(), code, to, act)
	if err != nil {
		t.Fatal(err)
	}
	if again, err := s.Lend(context.Background(), code, to, act); err != nil || again.ID != loan.ID {
		t.Errorf("lent again: %+v, %v", again, err)
	}
	return loan
}

func takeInTwice(t *testing.T, s *Store, loan, place int64) Bottle {
	t.Helper()
	b, err := s.TakeIn(context.Background(), loan, place, clerk)
	if err != nil {
		t.Fatal(err)
	}
	if again, err := s.TakeIn(context.Background(), loan, place, clerk); err != nil || again.ID != b.ID || again.Content != b.Content {
		t.Errorf("taken in again: %+v, %v", again, err)
	}
	return b
}
