//! Prints what is understood of the text on standard input.

use std::io::Read;

fn main() {
    let mut text = String::new();
    if std::io::stdin().read_to_string(&mut text).is_ok() {
        print!("{}", layshaft_syntax::show::file(&layshaft_syntax::parse(&text)));
    }
}
