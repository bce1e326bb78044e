package verify_test
import ("testing";"drawup/dilution/formulary";"drawup/dilution/formulary/verify")
func TestStarter(t *testing.T){ f,err:=formulary.Default(); if err!=nil {t.Fatal(err)}
 for _,r:=range verify.Check(f){ if r.Code!="source-without-jurisdiction" {t.Errorf("%v: %s: %s got %s want %s",r.Pos,r.Code,r.Message,r.Got,r.Want)} } }
