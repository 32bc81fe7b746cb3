;;; dump.el --- writes what Emacs shows of the note  -*- lexical-binding: t; -*-
;; emacs -Q --batch -l init.el -l dump.el: to $INKJOULE_DUMP/now.json; then deletes
;; the line of the last finding and writes after.json, with the text in edited.joule.
(require 'eglot)
(require 'flymake)
(require 'json)

(defun file (name) (expand-file-name name (getenv "INKJOULE_DUMP")))

(defvar review
  (let ((json-object-type 'alist) (json-array-type 'list))
    (car (alist-get 'notes (json-read-file (getenv "INKJOULE_REVIEW"))))))

(defun place (at) (save-excursion (goto-char at) (cons (line-number-at-pos) (1+ (- at (line-beginning-position))))))

(defun diagnostics ()
  (vconcat
   (mapcar
    (lambda (d)
      (let ((from (place (flymake-diagnostic-beg d))) (to (place (flymake-diagnostic-end d)))
            (spec (alist-get 'eglot-lsp-diag (flymake-diagnostic-data d))))
        `((line . ,(car from)) (column . ,(cdr from)) (endLine . ,(car to)) (endColumn . ,(cdr to))
          (rule . ,(plist-get spec :code))
          (severity . ,(pcase (flymake-diagnostic-type d)
                         ('eglot-error "error") ('eglot-warning "caution") (_ "advice")))
          (message . ,(flymake-diagnostic-text d)))))
    (flymake-diagnostics))))

(defun hints ()
  (vconcat
   (delq nil
         (mapcar (lambda (o)
                   (when (or (overlay-get o 'joule-value) (overlay-get o 'eglot--inlay-hint))
                     `((line . ,(car (place (overlay-start o))))
                       (text . ,(substring-no-properties (or (overlay-get o 'after-string) (overlay-get o 'before-string)))))))
                 (overlays-in (point-min) (point-max))))))

(defun hover-text (contents)
  (cond ((stringp contents) contents)
        ((vectorp contents) (mapconcat #'hover-text contents "\n"))
        (t (or (plist-get contents :value) ""))))

(defun hovers ()
  (vconcat
   (delq nil
         (mapcar (lambda (v)
                   (goto-char (point-min))
                   (forward-line (1- (alist-get 'line v)))
                   (when (search-forward (alist-get 'name v) (line-end-position) t)
                     (goto-char (match-beginning 0))
                     (let ((reply (jsonrpc-request (eglot-current-server) :textDocument/hover (eglot--TextDocumentPositionParams))))
                       `((name . ,(alist-get 'name v)) (text . ,(hover-text (plist-get reply :contents)))))))
                 (alist-get 'values review)))))

(defun settle (before)
  "Wait until there are diagnostics unlike BEFORE, and all is still."
  (let ((until (+ (float-time) 20)) (since (float-time)) last)
    (while (and (< (float-time) until)
                (let ((now (list (diagnostics) (hints))))
                  (unless (equal now last) (setq last now since (float-time)))
                  (or (equal (car now) before) (< (- (float-time) since) 1.5))))
      (accept-process-output nil 0.1))))

(defun dump (name &rest more)
  (let ((json-encoding-pretty-print t))
    (with-temp-file (file name)
      (insert (json-encode (append more `((columns . "utf-32"))))))))

(condition-case err
    (progn
      (find-file (getenv "INKJOULE_NOTE"))
      ;; `eglot-ensure' waits for a command, of which a batch run has none.
      (apply #'eglot (eglot--guess-contact))
      (flymake-start)
      (settle [])
      (let ((now (diagnostics)))
        (dump "now.json" `(diagnostics . ,now) `(hints . ,(hints)) `(hovers . ,(hovers)))
        (goto-char (point-min))
        (forward-line (1- (alist-get 'line (car (last (alist-get 'findings review))))))
        (delete-region (point) (line-beginning-position 2))
        ;; Eglot tells the server of a change once Emacs is idle; a batch run never is.
        (eglot--signal-textDocument/didChange)
        (settle now))
      (dump "after.json" `(diagnostics . ,(diagnostics)) `(hints . ,(hints)))
      (let ((text (buffer-string)))
        (with-temp-file (file "edited.joule") (insert text)))
      (set-buffer-modified-p nil)
      (eglot-shutdown (eglot-current-server)))
  (error (with-temp-file (file "error.txt") (insert (format "%S\n" err)))))
