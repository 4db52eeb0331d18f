//! The demo client that the bare command opens.

use std::path::Path;

use plumbfold_records::{Client, Opened, Problem, read};

/// The file as it ships in `demo-profiles`.
const TEXT: &str = include_str!("../../../demo-profiles/demo-shape.ron");

/// The demo client.
///
/// # Errors
/// Never with the file as shipped; a test reads it.
pub fn client() -> Result<Client, Problem> {
    let file = Path::new("demo-profiles/demo-shape.ron");
    match read(TEXT.as_bytes(), file)? {
        Opened::Current(client) => Ok(client),
        Opened::Newer { format, .. } => Err(Problem {
            file: file.to_owned(),
            line: None,
            field: Some("format".to_owned()),
            value: format.to_string(),
            allowed: "the format of this version".to_owned(),
            hint: "build the program from one checkout",
        }),
    }
}

#[cfg(test)]
mod tests {
    #[test]
    fn the_demo_client_can_be_read() {
        super::client().expect("shipped with the program");
    }
}
