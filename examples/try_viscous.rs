//! Scratch.
use plankform::flow::*; use plankform::section::*;
fn main(){ let a:Vec<String>=std::env::args().collect();
 let s=Section::from_designation(&a[1], if a.len()>7 {TrailingEdge::Published} else {TrailingEdge::Closed}).expect("s");
 let p=Panelling::of(&s, 200).expect("p"); let v=Viscous::new(&p).expect("v");
 let re:f64=a[2].parse().unwrap(); let from:f64=a[3].parse().unwrap(); let to:f64=a[4].parse().unwrap(); let st:f64=a[5].parse().unwrap();
 let trip: Option<f64>= a.get(6).and_then(|t| t.parse().ok()).filter(|t|*t<1.0);
 let mut x=from; while x<=to+1e-9 { v.debug(x.to_radians(), &Conditions{reynolds:re,amplification:9.0,trip_upper:trip,trip_lower:trip}); x+=st; } }
