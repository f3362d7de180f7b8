//! x
use std::path::Path;
#[test]
fn scratch() {
    for p in ["/tmp/a/big", "/tmp/a/big.xlsx", "/tmp/a/bad"] {
        if !Path::new(p).exists() { continue; }
        let t = std::time::Instant::now();
        let r = schedule_io::read::read_book(Path::new(p)).unwrap();
        println!("{p} {:?} {} {:?}", t.elapsed(), r.queries.len(), r.book.map(|b| b.layout.panels.len()));
    }
    std::fs::write("/tmp/a/starter.xlsx", schedule_io::starter::starter_book().unwrap()).unwrap();
}
