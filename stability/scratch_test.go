package stability
import ("testing";"fmt")
func TestScratch(t *testing.T){
 l:=Layer{Bottom:Rigid,Top:Rigid}
 s,_:=NewSolver(l,nil)
 o,_:=s.Critical()
 fmt.Println(o)
 g:=growing{engine:&s.engine,drive:s.drives(o.Rayleigh)}
 a,err:=g.follow(sample{k:o.Wavenumber},0,0)
 fmt.Println(a.Sigma,a.valueError,a.size,err)
 for i:=0;i<4;i++{
 sol,err:=s.engine.moving.level(i).work.Solve(growthKind(1,0),g.point(o.Wavenumber,0))
 fmt.Println(sol.Sigma,sol.Residual,err)
 r,_:=g.rates(o.Wavenumber,i)
 fmt.Println(r[:3])
 }
}
