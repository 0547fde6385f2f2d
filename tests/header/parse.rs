//! Reads the functions and macros of the C header, as far as its manners go.

/// A parameter: its type without `struct` and with `const` and stars kept, and its name.
#[derive(Clone, Debug, PartialEq)]
pub struct Parameter {
    pub kind: String,
    pub name: String,
}

impl Parameter {
    pub fn new(kind: &str, name: &str) -> Self {
        Self { kind: kind.to_owned(), name: name.to_owned() }
    }

    /// The type behind const and stars.
    pub fn base(&self) -> &str {
        self.kind.trim_start_matches("const ").trim_end_matches(['*', ' '])
    }

    pub fn is_pointer(&self) -> bool {
        self.kind.contains('*')
    }

    pub fn is_handle(&self) -> bool {
        self.base().starts_with("bmom_")
    }

    /// An array or text that the function reads.
    pub fn is_input_array(&self) -> bool {
        self.is_pointer() && self.kind.starts_with("const ") && !self.is_handle()
    }

    /// Room that the function writes to.
    pub fn is_output(&self) -> bool {
        self.is_pointer() && !self.kind.starts_with("const ") && (!self.is_handle() || self.kind.ends_with("**"))
    }
}

/// A function with the comment above it.
#[derive(Clone, Debug)]
pub struct Function {
    pub name: String,
    pub returns: String,
    pub parameters: Vec<Parameter>,
    pub comment: String,
}

/// All functions of a header, in order.
pub fn functions(header: &str) -> Vec<Function> {
    let mut functions = Vec::new();
    let mut comment = String::new();
    let mut statement = String::new();
    let mut rest = header;
    loop {
        // The preprocessor's lines are no statements.
        rest = rest.trim_start();
        if rest.is_empty() {
            return functions;
        }
        if rest.starts_with('#') {
            rest = rest.split_once('\n').map_or("", |(_, after)| after);
        } else if let Some(after) = rest.strip_prefix("/*") {
            let (text, after) = after.split_once("*/").expect("a comment ends");
            comment = text.split_whitespace().collect::<Vec<_>>().join(" ");
            rest = after;
        } else if let Some(after) = rest.strip_prefix("extern \"C\" {") {
            rest = after.split_once('\n').map_or("", |(_, after)| after);
        } else if rest.starts_with('}') {
            rest = rest.split_once('\n').map_or("", |(_, after)| after);
        } else {
            let (text, after) = rest.split_once(';').expect("a statement ends");
            statement.clear();
            statement.push_str(&text.split_whitespace().collect::<Vec<_>>().join(" "));
            if statement.contains('(') {
                functions.push(function(&statement, std::mem::take(&mut comment)));
            }
            rest = after;
        }
    }
}

fn function(statement: &str, comment: String) -> Function {
    let (head, parameters) = statement.split_once('(').expect("a function has parameters");
    let Parameter { kind: returns, name } = parameter(head);
    let parameters = parameters.trim_end_matches(')');
    let parameters = if parameters == "void" { Vec::new() } else { parameters.split(',').map(parameter).collect() };
    Function { name, returns, parameters, comment }
}

fn parameter(text: &str) -> Parameter {
    let text = text.trim();
    let at = text.rfind(['*', ' ']).map_or(0, |at| at + 1);
    let (kind, name) = text.split_at(at);
    Parameter {
        kind: kind.replace("struct ", "").replace(" *", "*").trim().replacen('*', " *", 1),
        name: name.to_owned(),
    }
}

/// The macros with a value: name without `BMOM_`, value without its comment.
pub fn macros(header: &str) -> Vec<(String, String)> {
    header
        .lines()
        .filter_map(|line| line.strip_prefix("#define BMOM_"))
        .map(|line| {
            let (name, value) = line.split_once(' ').unwrap_or((line, ""));
            (name.to_owned(), value.split("/*").next().unwrap_or("").trim().to_owned())
        })
        .collect()
}
