//! Marking of whole folders, for checks from outside.

use tautplan::drawing::{insert, open};

use crate::kept::mark;
use crate::sheets::sheet;

/// Marks every drawing of the folder `DRAWINGS` into the folder `MARKED`, for checks from outside (such as
/// `tests/python/check_lossless.py`); a drawing that is refused is named in `refused.txt` there.
#[test]
#[ignore = "needs folders: DRAWINGS=from MARKED=to cargo test --test insertion -- --ignored"]
fn mark_a_folder() {
    let folder = |name: &str| std::path::PathBuf::from(std::env::var_os(name).expect("a folder"));
    let mut paths: Vec<_> = std::fs::read_dir(folder("DRAWINGS"))
        .expect("a folder")
        .map(|entry| entry.expect("an entry").path())
        .collect();
    paths.sort();
    let mut refused = String::new();
    for path in paths {
        let name = path.file_name().expect("a name");
        match open(std::fs::read(&path).expect("a file")) {
            Ok(source) => {
                let marked = insert(&source, 0.001, &sheet()).expect("a sheet");
                let again = mark(&marked, &sheet());
                assert!(again == marked, "{path:?}: a second time differs");
                std::fs::write(folder("MARKED").join(name), marked).expect("written");
            }
            Err(refusal) => {
                refused += &path.display().to_string();
                refused += ": ";
                refused += &refusal.to_string();
                refused += "\n";
            }
        }
    }
    std::fs::write(folder("MARKED").join("refused.txt"), refused).expect("written");
}
