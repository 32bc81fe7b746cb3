;;; init.el --- what a user writes (see ../README.md)  -*- lexical-binding: t; -*-
;; `-Q' hides Debian's packages, so their folder is named here.
(add-to-list 'package-directory-list "/usr/share/emacs/site-lisp/elpa")
(package-initialize)
(load (expand-file-name "../joule-mode" (file-name-directory load-file-name)) nil t)
(setq joule-program (getenv "INKJOULE"))
(add-hook 'joule-mode-hook #'eglot-ensure)
(setq make-backup-files nil auto-save-default nil create-lockfiles nil)
