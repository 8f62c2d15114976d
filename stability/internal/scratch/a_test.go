package scratch
import ("testing";"fmt";"math"
 "example.org/overturn/stability/internal/element"
 "example.org/overturn/stability/internal/pencil")
func build(p int, nodes []float64, fix int) *pencil.Pencil{
 l:=element.NewLayout(nodes,p,[]element.Field{{Class:element.C1,Fixed:[2]int{fix,fix}},{Class:element.C0,Fixed:[2]int{1,1}}})
 s:=1/math.Sqrt(1700.)
 op:=element.Operator{Excess:2,Coefficients:make([]func(float64)float64,1)}
 t:=func(part,pow,r,c,i,j int,sc float64){op.Terms=append(op.Terms,element.Term{Part:part,Power:pow,Row:r,Col:c,RowOrder:i,ColOrder:j,Scale:sc})}
 t(0,0,0,0,2,2,1);t(0,2,0,0,2,0,1);t(0,2,0,0,0,2,1);t(0,2,0,0,1,1,4);t(0,4,0,0,0,0,1)
 t(0,0,1,1,1,1,1);t(0,2,1,1,0,0,1)
 t(0,1,1,0,0,0,-1/s)
 t(2,1,0,1,0,0,-s)
 t(1,0,1,1,0,0,-1*-1*-1) // J has -sigma M: want +sigma theta => M=-mass
 return pencil.New(l.Size(),element.Assemble(l,&op))
}
func TestA(t *testing.T){
 for _,p:=range []int{6,8,10,12,14,16,18,22,30,40}{
  pc:=build(p,[]float64{0,1},2)
  w:=pencil.NewWorkspace(pc)
  v,err:=w.DriveEigenvalues(pencil.Point{K:3},0)
  if err!=nil{t.Fatal(err)}
  s,err:=w.Extremum(pencil.Curve{Kind:pencil.Marginal},pencil.Point{K:3,Drive:[3]float64{v[0]}},2,4)
  fmt.Println(p,v[0],err,s.Drive[0]/1707.761777104718-1,s.K/3.116323554821122-1,s.Curvature/2/s.Drive[0]-0.1480344524303647, s.Residual, 1/real(s.Sensitivity)/s.Drive[0]-0.05089283485530193)
 }
 for _,p:=range []int{8,10,12}{
  pc:=build(p,[]float64{0,.3,1},2)
  w:=pencil.NewWorkspace(pc)
  s,err:=w.Extremum(pencil.Curve{Kind:pencil.Marginal},pencil.Point{K:3,Drive:[3]float64{1707}},2,4)
  fmt.Println(p,err,s.Drive[0]/1707.761777104718-1,s.K/3.116323554821122-1)
  g,err:=w.GrowthEigenvalues(pencil.Point{K:3.116,Sigma:100,Drive:[3]float64{2000}})
  fmt.Println(g[:3],err, g[0]-3.363654221807718)
  gg,err:=w.Solve(pencil.Curve{Kind:pencil.Growth},pencil.Point{K:3.116,Sigma:3,Drive:[3]float64{2000}})
  fmt.Println(real(gg.Sigma)-3.363654221807718,err)
 }
}
func BenchmarkA(b *testing.B){
 b.Run("build",func(b *testing.B){ b.ReportAllocs();for b.Loop(){build(14,[]float64{0,1},2)}})
 pc:=build(10,[]float64{0,1},2)
 w:=pencil.NewWorkspace(pc)
 b.Run("eig",func(b *testing.B){b.ReportAllocs();for b.Loop(){w.DriveEigenvalues(pencil.Point{K:3},0)}})
 b.Run("solve",func(b *testing.B){b.ReportAllocs();for b.Loop(){w.Solve(pencil.Curve{Kind:pencil.Marginal},pencil.Point{K:3.,Drive:[3]float64{1711}})}})
 pc=build(14,[]float64{0,1},2)
 w=pencil.NewWorkspace(pc)
 b.Run("ext",func(b *testing.B){b.ReportAllocs();for b.Loop(){w.Extremum(pencil.Curve{Kind:pencil.Marginal},pencil.Point{K:3.,Drive:[3]float64{1711}},2,4)}})
 b.Run("growth",func(b *testing.B){b.ReportAllocs();for b.Loop(){w.GrowthEigenvalues(pencil.Point{K:3.116,Sigma:100,Drive:[3]float64{2000}})}})
 b.Run("growths",func(b *testing.B){b.ReportAllocs();for b.Loop(){w.Solve(pencil.Curve{Kind:pencil.Growth},pencil.Point{K:3.116,Sigma:3,Drive:[3]float64{2000}})}})
}
