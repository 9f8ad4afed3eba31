;;; A session of emacs with foulcase, for clients_test.go  -*- lexical-binding: t -*-

;; Opens $DOCUMENT, waits for $MARKS marks, corrects $CORRECT and makes $HOUSE a
;; house word by code actions, puts "🪢 " before each line that has text and $MEANT
;; for $RETYPED, and writes what the editor shows after each step to $REPORT, as JSON.

(require 'cl-lib)
(require 'json)

(defconst patience 30 "Seconds for each step.")

(defun await (what condition)
  "Wait until CONDITION holds, which WHAT describes."
  (let ((end (+ (float-time) patience)))
    (while (not (funcall condition))
      (when (> (float-time) end)
        (error "%s is waited for in vain; shown are %S" what (shown)))
      (accept-process-output nil 0.05))))

(defvar judged nil "The version of the text that diagnostics came for last.")

(advice-add 'eglot-handle-notification :after
            (lambda (_server method &rest about)
              (when (eq method 'textDocument/publishDiagnostics)
                (setq judged (plist-get about :version)))))

(defun await-marks (count when)
  "Wait for COUNT marks that are of the text as it is."
  (await (format "%d marks, %s" count when)
         (lambda ()
           (and (eql judged eglot--versioned-identifier)
                (= count (length (flymake-diagnostics)))))))

(defun covered (mark)
  "The text under MARK."
  (buffer-substring-no-properties (flymake-diagnostic-beg mark) (flymake-diagnostic-end mark)))

(defun column (position)
  "Code points between the start of the line and POSITION."
  (save-excursion
    (goto-char position)
    (- position (line-beginning-position))))

(defun shown ()
  "The text, with its marks in the order of the text."
  (list
   (cons 'text (buffer-substring-no-properties (point-min) (point-max)))
   (cons 'marks
         (vconcat
          (mapcar
           (lambda (mark)
             (list (cons 'line (1- (line-number-at-pos (flymake-diagnostic-beg mark))))
                   (cons 'start (column (flymake-diagnostic-beg mark)))
                   (cons 'stop (column (flymake-diagnostic-end mark)))
                   (cons 'covers (covered mark))
                   (cons 'message (flymake-diagnostic-text mark))))
           (sort (flymake-diagnostics)
                 (lambda (a b) (< (flymake-diagnostic-beg a) (flymake-diagnostic-beg b)))))))))

(defun act (form title)
  "Take the first code action on FORM whose title begins with TITLE."
  (let ((mark (cl-find form (flymake-diagnostics) :key #'covered :test #'equal))
        (last-nonmenu-event t))         ; not the mouse
    (goto-char (flymake-diagnostic-beg mark))
    (cl-letf (((symbol-function 'completing-read)
               (lambda (_prompt items &rest _)
                 (or (cl-find title (mapcar #'car items) :test #'string-prefix-p)
                     (error "No code action begins with %s among %S" title (mapcar #'car items))))))
      (eglot-code-actions (flymake-diagnostic-beg mark) (flymake-diagnostic-end mark) nil t))))

(defun retype (pattern replacement)
  "Put REPLACEMENT for what matches PATTERN, all over the text."
  (goto-char (point-min))
  (while (re-search-forward pattern nil t)
    (replace-match replacement t)))     ; letters as they are

(defun session ()
  (find-file (getenv "DOCUMENT"))
  (unless (derived-mode-p 'text-mode)
    (text-mode))
  (let ((count (string-to-number (getenv "MARKS")))
        opened corrected housed typed)
    (run-hooks 'post-command-hook)      ; as after a command; batch mode has none
    (await "a server" #'eglot-current-server)
    (await-marks count "the document opened")
    (setq opened (shown))

    (act (getenv "CORRECT") "Correct to")
    (save-buffer)
    (await-marks (1- count) "one corrected")
    (setq corrected (shown))

    (act (getenv "HOUSE") "Add ")
    (await-marks (- count 2) "one a house word")
    (setq housed (shown))

    (retype "^\\([^\n]\\)" "🪢 \\1")
    (retype (getenv "RETYPED") (getenv "MEANT"))
    (save-buffer)
    (await-marks (- count 3) "lines changed and one retyped")
    (setq typed (shown))

    (eglot-shutdown (eglot-current-server))
    (let ((coding-system-for-write 'utf-8-unix))
      (write-region (json-encode `((opened . ,opened) (corrected . ,corrected) (housed . ,housed) (typed . ,typed)))
                    nil (getenv "REPORT")))))

(setq debug-on-error nil)
(condition-case problem
    (session)
  (error
   (message "%s" (error-message-string problem))
   (dolist (buffer (buffer-list))
     (when (string-match-p "EGLOT" (buffer-name buffer))
       (message "%s:\n%s" (buffer-name buffer)
                (with-current-buffer buffer (buffer-substring-no-properties (point-min) (point-max))))))
   (kill-emacs 1)))
