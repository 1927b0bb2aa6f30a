//! Files inside a PDF: put in as the source of the document, and taken out again.
//!
//! Reading trusts nothing: a foreign, cut or hostile file gives an error.

use std::collections::BTreeSet;
use std::panic::{AssertUnwindSafe, catch_unwind};

use lopdf::{Dictionary, Document, Object, ObjectId, Stream};

use crate::worksheet::Error;

/// The largest attached file that is read, in bytes: 64 MiB, as for a notebook.
pub const MOST: usize = 64 << 20;

/// The largest PDF that is read, in bytes.
const MOST_PDF: usize = 256 << 20;

/// Levels of a name tree that are followed.
const MOST_LEVELS: usize = 16;

/// A file inside a PDF.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Attachment {
    /// Its file name.
    pub name: String,
    /// Its media type, if the PDF says one: `application/json`.
    pub media_type: Option<String>,
    /// What the PDF says it is, if anything.
    pub description: Option<String>,
    /// Its bytes.
    pub contents: Vec<u8>,
}

/// Returns the PDF with one more file attached, marked as the source from which
/// the document was made.
///
/// A file of the same name is replaced. The same input gives the same bytes.
///
/// # Errors
///
/// [`Error::Name`] for a name that is empty or has folders in it,
/// [`Error::TooLarge`] beyond [`MOST`] bytes, [`Error::Damaged`] or
/// [`Error::Encrypted`] if `pdf` cannot be read, [`Error::Write`] if it cannot be
/// written again.
///
/// # Examples
///
/// ```
/// use farglow::drawing::picture::Picture;
/// use farglow::worksheet::{attach, paint};
///
/// let pdf = paint::pdf(&[Picture::new(595.0, 842.0)], &paint::Meta::default())?;
/// let with = attach::attach(&pdf, "door.farglow", "application/json", b"{}", "the notebook")?;
/// assert_eq!(attach::extract(&with)?[0].contents, b"{}");
/// # Ok::<(), farglow::worksheet::Error>(())
/// ```
pub fn attach(
    pdf: &[u8],
    name: &str,
    media_type: &str,
    contents: &[u8],
    description: &str,
) -> Result<Vec<u8>, Error> {
    let folder = name.contains(['/', '\\', '\0']) || name == "." || name == "..";
    if name.is_empty() || folder || name.chars().any(char::is_control) {
        return Err(Error::Name(name.to_owned()));
    }
    if contents.len() > MOST {
        return Err(Error::TooLarge {
            name: name.to_owned(),
            most: MOST,
        });
    }
    guarded(|| {
        let mut file = open(pdf)?;
        let mut files: Vec<(Vec<u8>, Object)> = specifications(&file)
            .into_iter()
            .map(|(key, spec)| (key, Object::Reference(spec)))
            .collect();

        let mut parameters = Dictionary::new();
        parameters.set("Size", contents.len() as i64);
        let mut stream = Dictionary::new();
        stream.set("Type", Object::Name(b"EmbeddedFile".to_vec()));
        stream.set("Subtype", Object::Name(media_type.as_bytes().to_vec()));
        stream.set("Params", parameters);
        let mut stream = Stream::new(stream, contents.to_vec());
        stream
            .compress()
            .map_err(|error| Error::Write(error.to_string()))?;
        let embedded = file.add_object(stream);

        let mut embeds = Dictionary::new();
        embeds.set("F", embedded);
        embeds.set("UF", embedded);
        let mut spec = Dictionary::new();
        spec.set("Type", Object::Name(b"Filespec".to_vec()));
        spec.set("F", lopdf::text_string(name));
        spec.set("UF", lopdf::text_string(name));
        spec.set("Desc", lopdf::text_string(description));
        spec.set("AFRelationship", Object::Name(b"Source".to_vec()));
        spec.set("EF", embeds);
        let spec = file.add_object(spec);

        let key = name_key(name);
        files.retain(|(other, _)| *other != key);
        files.push((key, Object::Reference(spec)));
        // A name tree is searched by halving, so its keys are in order.
        files.sort_by(|a, b| a.0.cmp(&b.0));
        let associated: Vec<Object> = files.iter().map(|(_, spec)| spec.clone()).collect();
        let names: Vec<Object> = files
            .into_iter()
            .flat_map(|(key, spec)| [Object::String(key, lopdf::StringFormat::Hexadecimal), spec])
            .collect();
        let mut leaf = Dictionary::new();
        leaf.set("Names", names);

        let mut trees = file
            .catalog()
            .ok()
            .and_then(|catalog| catalog.get(b"Names").ok())
            .and_then(|object| resolved(&file, object))
            .and_then(|object| object.as_dict().ok().cloned())
            .unwrap_or_default();
        trees.set("EmbeddedFiles", leaf);
        let catalog = file.catalog_mut().map_err(|error| damaged(&error))?;
        catalog.set("Names", trees);
        catalog.set("AF", associated);

        let mut bytes = Vec::new();
        file.save_to(&mut bytes)
            .map_err(|error| Error::Write(error.to_string()))?;
        Ok(bytes)
    })
}

/// Returns the files attached to a PDF, in the order of their names.
///
/// # Errors
///
/// [`Error::NothingAttached`] if there is none, [`Error::Damaged`] if the bytes
/// are not a readable PDF, [`Error::Encrypted`] if it is protected,
/// [`Error::TooLarge`] if an attached file unpacks to more than [`MOST`] bytes.
pub fn extract(pdf: &[u8]) -> Result<Vec<Attachment>, Error> {
    guarded(|| {
        let file = open(pdf)?;
        let mut found = Vec::new();
        for (key, spec) in specifications(&file) {
            if let Some(attachment) = read(&file, &key, spec)? {
                found.push(attachment);
            }
        }
        if found.is_empty() {
            Err(Error::NothingAttached)
        } else {
            Ok(found)
        }
    })
}

/// The PDF library parses what anybody may have written: a fault of its own is
/// reported like one of the file.
fn guarded<T>(work: impl FnOnce() -> Result<T, Error>) -> Result<T, Error> {
    catch_unwind(AssertUnwindSafe(work))
        .unwrap_or_else(|_| Err(Error::Damaged("its structure makes no sense".to_owned())))
}

fn damaged(error: &dyn std::fmt::Display) -> Error {
    Error::Damaged(error.to_string())
}

fn open(pdf: &[u8]) -> Result<Document, Error> {
    if pdf.is_empty() {
        return Err(Error::Damaged("it is empty".to_owned()));
    }
    if pdf.len() > MOST_PDF {
        return Err(Error::Damaged(format!(
            "it is larger than {MOST_PDF} bytes"
        )));
    }
    // Readers allow a little before the head; nothing else is a PDF.
    let head = &pdf[..pdf.len().min(1024)];
    if !head.windows(5).any(|five| five == b"%PDF-") {
        return Err(Error::Damaged("it does not begin like a PDF".to_owned()));
    }
    let file = Document::load_mem(pdf).map_err(|error| damaged(&error))?;
    if file.is_encrypted() || file.trailer.has(b"Encrypt") {
        return Err(Error::Encrypted);
    }
    Ok(file)
}

fn resolved<'a>(file: &'a Document, object: &'a Object) -> Option<&'a Object> {
    file.dereference(object).ok().map(|(_, object)| object)
}

/// The key under which a name is filed.
fn name_key(name: &str) -> Vec<u8> {
    match lopdf::text_string(name) {
        Object::String(bytes, _) => bytes,
        _ => name.as_bytes().to_vec(),
    }
}

/// Every file specification of the name tree and of the associated files, with
/// its key, in order and each once.
fn specifications(file: &Document) -> Vec<(Vec<u8>, ObjectId)> {
    let mut found = Vec::new();
    let Ok(catalog) = file.catalog() else {
        return found;
    };
    let tree = catalog
        .get(b"Names")
        .ok()
        .and_then(|names| resolved(file, names))
        .and_then(|names| names.as_dict().ok())
        .and_then(|names| names.get(b"EmbeddedFiles").ok());
    let mut seen = BTreeSet::new();
    if let Some(tree) = tree {
        walk(file, tree, MOST_LEVELS, &mut seen, &mut found);
    }
    let associated = catalog
        .get(b"AF")
        .ok()
        .and_then(|list| resolved(file, list))
        .and_then(|list| list.as_array().ok());
    for object in associated.into_iter().flatten() {
        if let Ok(id) = object.as_reference()
            && !found.iter().any(|(_, other)| *other == id)
        {
            let name = file
                .get_dictionary(id)
                .ok()
                .and_then(|spec| text(file, spec, &[b"UF", b"F"]));
            found.push((name.as_deref().map(name_key).unwrap_or_default(), id));
        }
    }
    found
}

fn walk(
    file: &Document,
    node: &Object,
    levels: usize,
    seen: &mut BTreeSet<ObjectId>,
    found: &mut Vec<(Vec<u8>, ObjectId)>,
) {
    if let Ok(id) = node.as_reference()
        && !seen.insert(id)
    {
        return;
    }
    let Some(Ok(node)) = resolved(file, node).map(Object::as_dict) else {
        return;
    };
    if let Some(Ok(names)) = node
        .get(b"Names")
        .ok()
        .and_then(|names| resolved(file, names))
        .map(Object::as_array)
    {
        for pair in names.chunks_exact(2) {
            if let (Some(Ok(key)), Ok(spec)) = (
                resolved(file, &pair[0]).map(Object::as_str),
                pair[1].as_reference(),
            ) && !found.iter().any(|(_, other)| *other == spec)
            {
                found.push((key.to_vec(), spec));
            }
        }
    }
    if levels == 0 {
        return;
    }
    if let Some(Ok(kids)) = node
        .get(b"Kids")
        .ok()
        .and_then(|kids| resolved(file, kids))
        .map(Object::as_array)
    {
        for kid in kids {
            walk(file, kid, levels - 1, seen, found);
        }
    }
}

/// The first of several text entries that is there.
fn text(file: &Document, dictionary: &Dictionary, keys: &[&[u8]]) -> Option<String> {
    keys.iter().find_map(|key| {
        let object = resolved(file, dictionary.get(key).ok()?)?;
        lopdf::decode_text_string(object).ok()
    })
}

fn read(file: &Document, key: &[u8], spec: ObjectId) -> Result<Option<Attachment>, Error> {
    let Ok(spec) = file.get_dictionary(spec) else {
        return Ok(None);
    };
    let name = text(file, spec, &[b"UF", b"F"])
        .unwrap_or_else(|| String::from_utf8_lossy(key).into_owned());
    let stream = spec
        .get(b"EF")
        .ok()
        .and_then(|object| resolved(file, object))
        .and_then(|object| object.as_dict().ok())
        .and_then(|embeds| embeds.get(b"UF").or_else(|_| embeds.get(b"F")).ok())
        .and_then(|object| resolved(file, object))
        .and_then(|object| object.as_stream().ok());
    let Some(stream) = stream else {
        return Ok(None);
    };
    let contents = if stream.dict.has(b"Filter") {
        let unpacked = stream.decompressed_content_with_limit(MOST + 1);
        unpacked.map_err(|error| match error {
            lopdf::Error::Decompress(lopdf::DecompressError::MemoryLimitExceeded { .. }) => {
                Error::TooLarge {
                    name: name.clone(),
                    most: MOST,
                }
            }
            other => Error::Damaged(format!("the attached `{name}` does not unpack ({other})")),
        })?
    } else {
        stream.content.clone()
    };
    if contents.len() > MOST {
        return Err(Error::TooLarge { name, most: MOST });
    }
    // The size is written beside the stream: one that was cut short is found out.
    let size = stream
        .dict
        .get(b"Params")
        .ok()
        .and_then(|object| resolved(file, object))
        .and_then(|object| object.as_dict().ok())
        .and_then(|parameters| parameters.get(b"Size").ok())
        .and_then(|size| size.as_i64().ok());
    if let Some(size) = size
        && usize::try_from(size) != Ok(contents.len())
    {
        return Err(Error::Damaged(format!(
            "the attached `{name}` has {} bytes instead of {size}",
            contents.len()
        )));
    }
    let media_type = stream
        .dict
        .get(b"Subtype")
        .ok()
        .and_then(|object| object.as_name().ok());
    Ok(Some(Attachment {
        media_type: media_type.map(|bytes| String::from_utf8_lossy(bytes).into_owned()),
        description: text(file, spec, &[b"Desc"]),
        name,
        contents,
    }))
}

#[cfg(test)]
mod tests;
