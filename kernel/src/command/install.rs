//! `gudgeon install` and `gudgeon uninstall`: the kernel in Jupyter's list, and what is prepared for it.

use super::Place;
use crate::error::Error;
use crate::kernelspec::{self, Typesetting};
use crate::library::{DataFolder, Library};
use crate::notebook::absolute;
use crate::progress::Progress;

impl Place {
    fn kernels(&self) -> Result<kernelspec::Place, Error> {
        match &self.prefix {
            Some(prefix) if prefix.is_file() => Err(Error::NotFolder(prefix.clone())),
            Some(prefix) => Ok(kernelspec::Place::below(&absolute(prefix)?)),
            None => kernelspec::Place::of_user(),
        }
    }
}

pub(super) fn install(place: &Place) -> Result<(), Error> {
    install_at(&place.kernels()?)
}

pub(super) fn install_at(place: &kernelspec::Place) -> Result<(), Error> {
    // Preparing takes minutes: a place that cannot be used is said before.
    kernelspec::check(place)?;
    let progress = Progress::of_unknown_length();
    let data = DataFolder::open()?;
    let library = Library::prepare(&data, &progress)?;
    let typesetting = kernelspec::install(place, &progress)?;
    progress.finish();
    println!("kernel           {}", place.folder().display());
    println!("helper library   {}", library.folder().display());
    match typesetting {
        Typesetting::Ready => println!("typesetting      ready"),
        Typesetting::Plain(reason) => {
            println!("typesetting      plain: {reason}");
            println!("                 install npm and run `gudgeon install` again for the better one;");
            println!("                 everything is readable without it");
        }
    }
    Ok(())
}

pub(super) fn uninstall(place: &Place) -> Result<(), Error> {
    let place = place.kernels()?;
    let data = DataFolder::open()?;
    let removed = kernelspec::uninstall(&place)?;
    let libraries = Library::remove_all(&data)?;
    if !removed && libraries == 0 {
        return Err(Error::NotInstalled(place.folder()));
    }
    if removed {
        println!("removed          {}", place.folder().display());
    }
    if libraries > 0 {
        println!("removed          {}", data.libraries().display());
    }
    if data.own_jupyter().exists() {
        println!(
            "left             {} (JupyterLab; delete the folder if you do not need it)",
            data.own_jupyter().display()
        );
    }
    Ok(())
}
