//! Scratch.
use plankform::flow::*;
fn main(){
 for beta in [-0.18f64,-0.1,0.0,0.3,1.0] { let m=beta/(2.0-beta);
  let st: Vec<[f64;2]>=(0..100).map(|i|{let x=0.001*(1000f64).powf(i as f64/99.0);[x,x.powf(m)]}).collect();
  let l=layer_along(&st,&Conditions::free(1e5,20.0)).unwrap(); let p=l.last().unwrap();
  let re=1e5*p.speed*p.length; println!("beta {beta} n {} H {:.4} theta* {:.4} cf {:.4}", l.len(), p.shape(), p.theta/p.length*re.sqrt(), p.cf*re.sqrt());
 }
 for re in [1e6,5e6,1e7,1e8] { let st: Vec<[f64;2]>=(0..200).map(|i|[0.0001*(10000f64).powf(i as f64/199.0),1.0]).collect();
  let l=layer_along(&st,&Conditions::free(re,9.0).tripped(1e5/re)).unwrap(); let p=l.last().unwrap();
  println!("re {re:e} H {:.3} CF {:.6} cf {:.6} itt {:.6} ps {:.6} psl {:.6}", p.shape(), 2.0*p.theta, p.cf, 0.075/(re.log10()-2.0).powi(2), 0.455/re.log10().powf(2.58), (2.0*re.log10()-0.65).powf(-2.3)); }
 let st: Vec<[f64;2]>=(0..300).map(|i|[0.001*(1000f64).powf(i as f64/299.0),1.0]).collect();
 let l=layer_along(&st,&Conditions::free(5e6,9.0)).unwrap(); let t=l.iter().find(|p|p.turbulent).unwrap(); println!("tr Rex {:e}", 5e6*t.length);
 let st: Vec<[f64;2]>=(0..300).map(|i|{let x=0.0001+0.14*i as f64/299.0;[x,1.0-x]}).collect();
 let l=layer_along(&st,&Conditions::free(1e5,20.0)).unwrap(); let p=l.last().unwrap(); println!("howarth {} H {}", p.length, p.shape());
 for p in l.windows(2) { if p[0].cf>0.0 && p[1].cf<=0.0 { println!("sep at {}", p[1].length); } }
}
