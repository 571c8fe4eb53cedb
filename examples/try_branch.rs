//! Scratch.
use plankform::flow::*; use plankform::section::*;
fn main(){
 let s=Section::from_designation("NACA 4412", TrailingEdge::Closed).expect("s");
 let p=Panelling::of(&s, 140).expect("p"); let v=Viscous::new(&p).expect("v");
 let c=Conditions::free(1e6,9.0);
 let a=v.at(0.03,&c,None).unwrap(); println!("{}", a.cl);
 let q=v.at(0.07,&c,Some(&a.state)).unwrap();
 let r=v.at(0.07,&c,None).unwrap();
 println!("{} {}", q.cl, r.cl);
 for ((n,l),m) in [("up",&q.upper.layers),("lo",&q.lower.layers),("wk",&q.wake)].into_iter().zip([&r.upper.layers,&r.lower.layers,&r.wake]) { for (p,o) in l.iter().zip(m.iter()).rev() { println!("{n} x {:.4} {:.4} ue {:.4} {:.4} th {:.3e} {:.3e} H {:.3} {:.3} N {:.2} {:.2} ct {:.4}", p.x,o.x,p.speed,o.speed,p.theta,o.theta,p.shape(),o.shape(),p.amplification,o.amplification,p.shear.sqrt()); } }
}
